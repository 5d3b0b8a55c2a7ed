"""The bench: the shaft in side view, true to scale, with everything that stands on it."""
