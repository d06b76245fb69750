"""Horizontal boundaries on the globe: GeoJSON (RFC 7946) in WGS84."""

import math

from exposure.assessment.model import Assessment, Boundary
from exposure.errors import ExposureError

SEMI_MAJOR = 6_378_137.0  # WGS84 [m]
ECCENTRICITY_SQUARE = 0.00669437999014
FARTHEST = 1000.0  # m: up to here the two radii are good to 0.1 m
DECIMALS = 8  # 1 mm


def boundaries_geojson(assessment: Assessment) -> dict:
    """A feature collection with one feature for each horizontal boundary, an empty one where the limit
    is not reached.

    Properties: limits, population, transmission, height_m (null: anywhere at 0-2 m above ground), section
    (null), level (exposure ratio of the line).

    Raises
    ------
    ExposureError
        There is no georeference, or a boundary reaches farther than 1 km from it.
    """
    if assessment.site.place_deg is None:
        raise ExposureError("boundaries cannot be put on a map: the site file has no [place]")
    to_degrees = local_to_degrees(*assessment.site.place_deg)
    features = [
        _feature(boundary, to_degrees) for boundary in assessment.boundaries if boundary.section is None
    ]
    return {"type": "FeatureCollection", "features": features}


def local_to_degrees(latitude: float, longitude: float):
    """Function from (east, north) [m] to (longitude, latitude) [degrees], by the ellipsoid's two radii."""
    sine = math.sin(math.radians(latitude))
    w = math.sqrt(1 - ECCENTRICITY_SQUARE * sine**2)
    meridian = SEMI_MAJOR * (1 - ECCENTRICITY_SQUARE) / w**3
    parallel = SEMI_MAJOR / w * math.cos(math.radians(latitude))

    def degrees(point):
        east, north = point
        distance = math.hypot(east, north)
        if distance > FARTHEST:
            raise ExposureError(
                f"a boundary reaches {distance:.0f} m from [place]; a map takes up to {FARTHEST:.0f} m"
            )
        return [
            round(longitude + math.degrees(east / parallel), DECIMALS),
            round(latitude + math.degrees(north / meridian), DECIMALS),
        ]

    return degrees


def _feature(boundary: Boundary, to_degrees) -> dict:
    rings = [
        [_ring(polygon.outline, to_degrees, 1), *(_ring(hole, to_degrees, -1) for hole in polygon.holes)]
        for polygon in boundary.polygons
    ]
    return {
        "type": "Feature",
        "properties": {
            "limits": boundary.limits,
            "population": boundary.population,
            "transmission": boundary.transmission,
            "height_m": boundary.height_m,
            "section": None,
            "level": boundary.level,
        },
        "geometry": {"type": "MultiPolygon", "coordinates": rings},
    }


def _ring(points, to_degrees, turn: int) -> list:
    """A closed ring, anticlockwise for turn 1 and clockwise for -1."""
    ring = [tuple(point) for point in points]
    ring = ring[:-1] if ring[0] == ring[-1] else ring
    area = sum(a[0] * b[1] - b[0] * a[1] for a, b in zip(ring, ring[1:] + ring[:1], strict=True))
    ring = ring if area * turn > 0 else ring[::-1]
    return [to_degrees(point) for point in (*ring, ring[0])]
