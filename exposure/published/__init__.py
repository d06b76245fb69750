"""Tables from print that are not exposure limits: soils, metals, cables, modes; printed units and digits."""
