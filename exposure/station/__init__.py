"""A station's transmissions as powers and as sources of fields."""
