"""A station and the places around it: plain facts, and the file that states them."""
