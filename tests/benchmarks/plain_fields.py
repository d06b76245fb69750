"""Fields of current elements the plain way: one broadcast, complex exponentials. The yardstick."""

import numpy as np

from fieldsolver.constants import FREE_SPACE_IMPEDANCE


def plain_fields(k, points, elements):
    """E and H (n, 3) as ``fieldsolver.radiation.fields_of_elements`` defines them."""
    separation = points[:, None, :] - elements.points[None, :, :]
    distance = np.sqrt((separation**2).sum(axis=2))
    wave = np.exp(-1j * k * distance) / distance
    gradient = (1 + 1j * k * distance) * wave / distance**2
    charge = np.einsum("nm,m,nmc->nc", gradient, elements.slopes, separation)
    electric = -1j * k * FREE_SPACE_IMPEDANCE / (4 * np.pi) * (wave @ elements.electric - charge / k**2)
    magnetic = -np.einsum("nm,nmc->nc", gradient, np.cross(separation, elements.magnetic[None])) / (4 * np.pi)
    return electric, magnetic
