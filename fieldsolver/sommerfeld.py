"""What a flat real ground adds in air: reflected potentials and their derivatives, tabulated.

Source and field point in air, exp(+j omega t), rho their horizontal distance, zeta = z + z',
R1 = sqrt(rho^2 + zeta^2), g = e^{-j k0 R1}/R1.  Mixed potentials of form C (K. A. Michalski and D. Zheng,
IEEE Trans. AP-38 (1990) 335-352; the half space itself: A. Sommerfeld, Ann. Phys. 28 (1909) 665 and
81 (1926) 1135), each reflected kernel

    K(rho, zeta) = integral over l from 0 of F(l) e^{-u0 zeta}/u0 J0(l rho) l dl

with the factors of ``sommerfeld_spectrum``.  K_xx: A_x of an x current, K_zz: A_z of a z current, K_phi:
potential of a charge, all beside the direct e^{-jkR}/R.  A z current also has horizontal A with
K_xz = -dF/dx, an x current has A_z with K_zx = +dF/dx (same with y).  E = -j omega A - grad phi;
A = mu0/4pi K . J; phi = 1/(4 pi eps0) K_phi q.  The magnetic field per moment/4pi is
curl(z G_TM) of a z current, and of an x current
(d2F/dxdy, dK_xx/dzeta - d2F/dx2, -dK_xx/dy).
"""

from dataclasses import dataclass
from typing import NamedTuple

import numpy as np

from fieldsolver.sommerfeld_spectrum import kappa, reflection_te, reflection_tm
from fieldsolver.sommerfeld_tables import Panels, cross_static, panels

__all__ = ["HalfSpace", "Potentials", "ReflectedFields", "half_space", "reflection_te", "reflection_tm"]


class Potentials(NamedTuple):
    """K_xx, K_phi, K_zz [1/m] and dF/drho [1/m], (n,) complex each."""

    k_xx: np.ndarray
    k_phi: np.ndarray
    k_zz: np.ndarray
    f_rho: np.ndarray


class ReflectedFields(NamedTuple):
    """Potentials and the derivatives that E and H need, (n,) complex each; [1/m], below f_rho [1/m2]."""

    k_xx: np.ndarray
    k_phi: np.ndarray
    k_zz: np.ndarray
    f_rho: np.ndarray
    k_phi_rho: np.ndarray
    k_phi_zeta: np.ndarray
    k_xx_rho: np.ndarray
    k_xx_zeta: np.ndarray
    g_tm_rho: np.ndarray
    f_rho_rho: np.ndarray
    f_rho_over_rho: np.ndarray


@dataclass(frozen=True)
class HalfSpace:
    """Reflected potentials over 0 <= rho <= rho_max, zeta_min <= zeta <= zeta_max, R1 > 0."""

    permittivity: complex
    k0: float
    rho_max: float
    zeta_min: float
    zeta_max: float
    four: Panels
    ten: Panels

    def potentials(self, rho, zeta) -> Potentials:
        """All that the ground adds to the potentials, at rho, zeta (n,) [m].

        Raises
        ------
        ValueError
            Outside the table.
        """
        rest = self.beyond_images(rho, zeta)
        g = _image(self.k0, np.hypot(rho, zeta))
        limit = kappa(self.permittivity)
        return Potentials(rest.k_xx, rest.k_phi - limit * g, rest.k_zz + 2 * limit * g, rest.f_rho)

    def beyond_images(self, rho, zeta) -> Potentials:
        """As ``potentials``, without -kappa g in K_phi and 2 kappa g in K_zz, kappa = (ec - 1)/(ec + 1).

        dF/drho is whole: its limit -kappa rho/(R1 (R1 + zeta)) is no image.
        """
        rho, zeta = self._inside(rho, zeta)
        r1 = np.hypot(rho, zeta)
        g = _image(self.k0, r1)
        k_xx, k_phi, k_zz, slope = self.four.values(rho, zeta)
        slope += cross_static(self.permittivity, self.k0, r1, zeta) * g
        return Potentials(k_xx, k_phi, k_zz, rho * slope)

    def fields(self, rho, zeta) -> ReflectedFields:
        """All that the ground adds, with its derivatives, at rho, zeta (n,) [m]; raises as ``potentials``."""
        rho, zeta = self._inside(rho, zeta)
        r1 = np.hypot(rho, zeta)
        g = _image(self.k0, r1)
        limit = kappa(self.permittivity)
        parts = self.ten.values(rho, zeta)
        k_xx, k_phi, k_zz, slope, k_phi_zeta, k_xx_zeta, laplacian, k_phi_rho, k_xx_rho, g_tm_rho = parts
        g_slope = -(1j * self.k0 + 1 / r1) * g / r1
        slope = slope + cross_static(self.permittivity, self.k0, r1, zeta) * g
        laplacian = laplacian + limit * g_slope * zeta
        return ReflectedFields(
            k_xx=k_xx,
            k_phi=k_phi - limit * g,
            k_zz=k_zz + 2 * limit * g,
            f_rho=rho * slope,
            k_phi_rho=k_phi_rho - limit * g_slope * rho,
            k_phi_zeta=k_phi_zeta - limit * g_slope * zeta,
            k_xx_rho=k_xx_rho,
            k_xx_zeta=k_xx_zeta,
            g_tm_rho=g_tm_rho + limit * g_slope * rho,
            f_rho_rho=laplacian - slope,
            f_rho_over_rho=slope,
        )

    def _inside(self, rho, zeta):
        rho, zeta = np.asarray(rho, float), np.asarray(zeta, float)
        if len(rho) and not (
            rho.max() <= self.rho_max and zeta.max() <= self.zeta_max and zeta.min() >= self.zeta_min
        ):
            raise ValueError(
                f"rho to {rho.max():.6g} m, zeta {zeta.min():.6g} .. {zeta.max():.6g} m: this table covers "
                f"rho to {self.rho_max:.6g} m, zeta {self.zeta_min:.6g} .. {self.zeta_max:.6g} m"
            )
        return rho, zeta


def half_space(
    ground_permittivity: complex, k0: float, rho_max: float, zeta_max: float, zeta_min: float = 0.0
) -> HalfSpace:
    """Tables for one frequency and ground.

    Parameters
    ----------
    ground_permittivity : complex
        Relative, ec = er - j sigma/(omega eps0). [1]
    k0 : float
        Wavenumber in air. [rad/m]
    rho_max, zeta_max, zeta_min : float
        What must be covered; zeta_min > 0 saves the panels below it. [m]
    """
    four, ten = panels(complex(ground_permittivity), k0, rho_max, zeta_max, zeta_min)
    return HalfSpace(complex(ground_permittivity), k0, rho_max, zeta_min, zeta_max, four, ten)


def _image(k0, r1):
    return np.exp(-1j * k0 * r1) / r1
