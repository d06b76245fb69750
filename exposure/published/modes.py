"""Duty factors of emissions: mean power while transmitting over peak envelope power.

FCC OET Bulletin 65, Supplement B (Edition 97-01), November 1997, table 2, p. 14, and the worksheet
in appendix B, p. 6 (read).  The syllables and pauses of speech are in the figures for voice; the
station's own pattern of transmitting and receiving is not.
"""

from dataclasses import dataclass


@dataclass(frozen=True)
class Mode:
    """percent: printed duty factor [%]; text: the emission; source: where it is printed."""

    percent: float
    text: str
    source: str

    @property
    def duty_factor(self) -> float:
        """[1]"""
        return self.percent / 100


_TABLE_2 = "FCC OET Bulletin 65 Supplement B, 1997, table 2"
_WORKSHEET = "FCC OET Bulletin 65 Supplement B, 1997, appendix B, worksheet p. 6"

MODES = {
    #                      %
    "ssb": Mode(20, "conversational SSB, no speech processing", _TABLE_2),
    "ssb_processed": Mode(50, "conversational SSB, heavy speech processing", _TABLE_2),
    "cw": Mode(40, "conversational CW", _TABLE_2),
    "fm": Mode(100, "voice FM", _TABLE_2),
    "rtty": Mode(100, "FSK or RTTY", _TABLE_2),
    "data": Mode(100, "AFSK on SSB and other data while the carrier is on", _TABLE_2),
    # of the two printed figures (50 % modulation: 0.5, 100 %: 0.3) the larger
    "am": Mode(50, "AM voice, 50 % modulation", _WORKSHEET),
    "sstv": Mode(100, "slow-scan television on SSB", _WORKSHEET),
    # of the two printed figures (image 0.6, black screen 0.8) the larger
    "atv": Mode(80, "amateur television, black screen", _WORKSHEET),
    "carrier": Mode(100, "unmodulated carrier, tuning", _TABLE_2),
}


def duty_factor_of_amplitude_modulation(depth: float) -> float:
    """Largest mean over peak envelope power of any amplitude modulation of a stated depth m. [1]

    The envelope is 1 + m x(t) with |x| <= 1 and no mean, so its mean square is at most 1 + m^2
    (reached by a square wave; a tone has 1 + m^2/2) and its peak (1 + m)^2.
    """
    return (1 + depth**2) / (1 + depth) ** 2
