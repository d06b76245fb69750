"""What a real ground adds beyond its closed-form image, to the matrix and to the fields.

The reflected potentials K minus the image's share (``reflection``) are smooth, so
currents act as few points (``pieces``).  With F' = dF/drho and the horizontal unit vector e from
source to point, the vector potential of a moment M is K_xx M_h - F' e M_z along the ground and
K_zz M_z + F' e . M_h upwards; charges have the potential K_phi (docs/theory.md).
"""

from dataclasses import dataclass

import numpy as np
from scipy import sparse

from fieldsolver.constants import FREE_SPACE_IMPEDANCE, SPEED_OF_LIGHT
from fieldsolver.emitters import Smooth
from fieldsolver.ground import LossyGround
from fieldsolver.ground_ends import GroundEnds
from fieldsolver.images import Image, image
from fieldsolver.pieces import pieces
from fieldsolver.reflection import Reflection

PAIRS = 1 << 17


@dataclass(frozen=True)
class HalfSpace:
    """The rest of a real ground: wavenumber k in air [rad/m], closed-form image, reflected potentials."""

    k: float
    image: Image
    reflection: Reflection

    def matrix(self, mesh, basis: sparse.csr_matrix, ends: GroundEnds) -> np.ndarray:
        """(N, N) part of the impedance matrix over j k eta/4 pi."""
        few = pieces(mesh, self.k)
        count = len(few.points)
        vector, scalar = np.zeros((count, count), complex), np.zeros((count, count), complex)
        i, j = np.triu_indices(count)
        for low in range(0, len(i), PAIRS):
            part = i[low : low + PAIRS], j[low : low + PAIRS]
            vector[part], scalar[part] = self._interactions(few, *part)
        for values in (vector, scalar):
            values[j, i] = values[i, j]
        moment, slope = (few.moment @ basis).tocsr(), (few.slope @ basis).tocsr()
        out = moment.T @ (moment.T @ vector).T - slope.T @ (slope.T @ scalar).T / self.k**2
        if len(ends.points):
            out -= self._of_ends(basis, few, slope, ends) / self.k**2
        return out

    def _interactions(self, few, i, j):
        """t . K t' and K_phi for pairs of points, the image's share taken out. [1/m]"""
        rho, zeta, unit = _cylinder(few.points[i], few.points[j])
        rest = self.reflection.potentials(rho, zeta)
        test, source = few.tangents[i], few.tangents[j]
        vector = rest["k_xx"] * (test[:, :2] * source[:, :2]).sum(axis=1)
        vector += rest["k_zz"] * test[:, 2] * source[:, 2]
        slope = rest["f_rho_over_rho"] * rho
        vector += slope * (test[:, 2] * (source[:, :2] * unit).sum(axis=1))
        vector -= slope * (source[:, 2] * (test[:, :2] * unit).sum(axis=1))
        return vector, rest["k_phi"]

    def _of_ends(self, basis, few, slope, ends):
        """Charges of ends on the ground with all charges: direct and image together, and the rest."""
        count = len(ends.points)
        both = 1 + self.image.charge
        here = (ends.slopes @ basis).toarray()
        potential = both * ((ends.potentials + ends.replaced) @ basis)
        rho, zeta, _ = _cylinder(
            np.repeat(ends.points, len(few.points), axis=0), np.tile(few.points, (count, 1))
        )
        rest = self.reflection.potentials(rho, zeta)["k_phi"].reshape(count, -1)
        between = here.T @ (potential + (slope.T @ rest.T).T)
        return between + between.T + here.T @ self._mutual(ends, both) @ here

    def _mutual(self, ends, both):
        """(n, n) potentials of the ends on each other; on themselves without the static part. [1/m]"""
        distance = np.linalg.norm(ends.points[:, None] - ends.points[None], axis=2)
        alone = np.eye(len(distance), dtype=bool)
        distance = np.where(alone, ends.radius, distance)
        wave = np.where(alone, -1j * self.k, np.exp(-1j * self.k * distance) / distance)
        flat = distance.reshape(-1)
        rest = self.reflection.potentials(flat, 0 * flat)["k_phi"]
        return both * wave + rest.reshape(distance.shape)

    def fields(self, points, sources: Smooth):
        """E (n, 3) [V/m] and H (n, 3) [A/m] of the rest at points (n, 3)."""
        rows = max(1, PAIRS // len(sources.points))
        parts = [self._fields(points[i : i + rows], sources) for i in range(0, len(points), rows)]
        return tuple(np.concatenate(fields) for fields in zip(*parts, strict=True))

    def _fields(self, points, sources):
        shape = (len(points), len(sources.points))
        rho, zeta, unit = _cylinder(
            np.repeat(points, shape[1], axis=0), np.tile(sources.points, (shape[0], 1))
        )
        rest = {name: values.reshape(shape) for name, values in self.reflection.fields(rho, zeta).items()}
        rest["f_rho"] = rest["f_rho_over_rho"] * rho.reshape(shape)
        x, y = unit[:, 0].reshape(shape), unit[:, 1].reshape(shape)
        parts = [_of_charges(rest, x, y, sources.slopes / self.k**2)]
        if sources.moments[:, :2].any():
            parts.append(_of_horizontal(rest, x, y, sources.moments[:, :2]))
        if sources.moments[:, 2].any():
            parts.append(_of_vertical(rest, x, y, sources.moments[:, 2]))
        electric, magnetic = (sum(fields) for fields in zip(*parts, strict=True))
        factor = -1j * self.k * FREE_SPACE_IMPEDANCE / (4 * np.pi)
        return factor * electric, magnetic / (4 * np.pi)


def _of_charges(rest, x, y, charge):
    """grad K_phi summed over charges c/k^2, and no magnetic field; (n, 3) each."""
    radial = rest["k_phi_rho"] * charge
    electric = [_dot(radial, x), _dot(radial, y), rest["k_phi_zeta"] @ charge]
    return np.stack(electric, axis=1), np.zeros((len(x), 3))


def _of_horizontal(rest, x, y, moment):
    """A of horizontal moments (m, 2): K_xx M_h and F' e . M upwards; and its curl."""
    mx, my = moment.T
    along = x * mx + y * my
    across = x * my - y * mx
    electric = [rest["k_xx"] @ mx, rest["k_xx"] @ my, _dot(rest["f_rho"], along)]
    turn = (rest["laplacian_f"] - 2 * rest["f_rho_over_rho"]) * along
    straight = rest["f_rho_over_rho"] - rest["k_xx_zeta"]
    magnetic = [
        _dot(turn, y) + straight @ my,
        -_dot(turn, x) - straight @ mx,
        _dot(rest["k_xx_rho"], across),
    ]
    return np.stack(electric, axis=1), np.stack(magnetic, axis=1)


def _of_vertical(rest, x, y, moment):
    """A of vertical moments (m,): K_zz M and -F' e M; its curl is that of the transverse-magnetic part."""
    radial, turning = rest["f_rho"] * moment, rest["tm_rho"] * moment
    electric = [-_dot(radial, x), -_dot(radial, y), rest["k_zz"] @ moment]
    magnetic = [_dot(turning, y), -_dot(turning, x), np.zeros(len(x))]
    return np.stack(electric, axis=1), np.stack(magnetic, axis=1)


def _dot(first, second):
    """(n,) sums over sources of products."""
    return np.einsum("nm,nm->n", first, second)


def half_space(ground, angular_frequency: float) -> HalfSpace | None:
    """The rest of a real ground, None over any other."""
    if not isinstance(ground, LossyGround):
        return None
    k = angular_frequency / SPEED_OF_LIGHT
    reflection = Reflection(ground.complex_permittivity(angular_frequency), k)
    return HalfSpace(k, image(ground, angular_frequency), reflection)


def _cylinder(points, sources):
    """Horizontal distance, sum of heights, and unit vector in plan (0 where there is none)."""
    across = points[:, :2] - sources[:, :2]
    rho = np.hypot(across[:, 0], across[:, 1])
    unit = across / np.maximum(rho, 1e-300)[:, None]
    return rho, points[:, 2] + sources[:, 2], unit
