"""Shaft files: JSON, SI, versioned; described in SHAFT_FILE.md and by shaft_file.schema.json beside this package."""

from shaftcore.shaft_file.reading import read_shaft, shaft_from_bytes, shaft_from_text
from shaftcore.shaft_file.writing import shaft_to_text, write_shaft

__all__ = ["read_shaft", "shaft_from_bytes", "shaft_from_text", "shaft_to_text", "write_shaft"]
