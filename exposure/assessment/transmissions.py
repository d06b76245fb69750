"""Findings about each transmission: powers, feed impedances, quality, distances."""

from exposure.assessment.model import (
    AveragePower,
    PowerStep,
    QualityInfo,
    TransmissionFinding,
)
from exposure.assessment.rules import averaging_times
from exposure.assessment.scene import Part, Scene
from exposure.assessment.uncertainty import Numerics
from exposure.site.model import Transmission
from exposure.station.powers import powers

NOT_SOLVED = QualityInfo(None, None, None, False, "no solution was found")


def transmission_findings(scene: Scene, reaches, numerics) -> tuple[TransmissionFinding, ...]:
    """Of every transmission, in the order of the file."""
    known = {
        transmission.name: (part, tuple(r for r in found if r.transmission is transmission), quality)
        for part, found, quality in zip(scene.parts, reaches, numerics, strict=True)
        for transmission in part.transmissions
    }
    reasons = dict(scene.unsolved)
    return tuple(
        _solved(scene, transmission, *known[transmission.name])
        if transmission.name in known
        else _unsolved(scene, transmission, reasons[transmission.name])
        for transmission in scene.site.transmissions
    )


def _solved(scene: Scene, transmission: Transmission, part: Part, reaches, numerics: Numerics):
    source = part.source
    segments = source.segments_per_wavelength
    mesh = () if segments is None else (f"mesh refined to {segments:g} segments a wavelength",)
    return TransmissionFinding(
        **_powers(scene, transmission),
        feed_impedances_ohm=tuple((z.real, z.imag) for z in source.feed_impedances),
        unknowns=source.unknowns,
        quality=QualityInfo(
            numerics.power_balance,
            numerics.boundary_residual,
            numerics.mesh_change,
            numerics.passed,
            "; ".join(numerics.objections()),
        ),
        results=tuple(reach.result() for reach in reaches),
        states=source.states,
        notes=(*source.model.notes, *mesh),
    )


def _unsolved(scene: Scene, transmission: Transmission, reason: str):
    return TransmissionFinding(
        **_powers(scene, transmission),
        feed_impedances_ohm=(),
        unknowns=0,
        quality=NOT_SOLVED,
        results=(),
        notes=(reason,),
    )


def _powers(scene: Scene, transmission: Transmission) -> dict:
    found = powers(transmission)
    times = sorted(
        {t for pair in scene.pairs() for t in averaging_times(*pair, transmission.frequency)},
    )
    return {
        "name": transmission.name,
        "antenna": transmission.antenna,
        "frequency_hz": transmission.frequency,
        "peak_power_w": transmission.peak_envelope_power,
        "line_loss_db": found.loss.decibel,
        "accepted_power_w": found.accepted,
        "average_powers": tuple(AveragePower(time, found.averaged(time)) for time in times),
        "exclusive": transmission.exclusive,
        "power_steps": tuple(PowerStep(s.text, s.factor, s.power, s.source) for s in found.steps(times)),
    }
