"""Plane-wave reflection of a ground, as factors of the mirrored current."""

import numpy as np

from fieldsolver.ground import FreeSpace, PerfectGround


def reflection(ground, angular_frequency: float, cosine: np.ndarray):
    """R_TM and R_TE at angles from up with this cosine, both (...). [1]

    R_TM = (ec cos - s)/(ec cos + s), R_TE = (cos - s)/(cos + s), s = sqrt(ec - sin^2)
    (J. A. Stratton, Electromagnetic Theory, 1941, sec. 9.4); 1 and -1 for a perfect conductor.
    """
    if isinstance(ground, FreeSpace):
        return np.zeros_like(cosine), np.zeros_like(cosine)
    if isinstance(ground, PerfectGround):
        return np.ones_like(cosine), -np.ones_like(cosine)
    permittivity = ground.complex_permittivity(angular_frequency)
    s = np.sqrt(permittivity - 1 + cosine**2)
    return (permittivity * cosine - s) / (permittivity * cosine + s), (cosine - s) / (cosine + s)
