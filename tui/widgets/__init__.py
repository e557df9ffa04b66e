"""Small widgets; what they show is made by pure functions."""
