"""Shaft files: JSON, SI, versioned; `PAGE` describes them to people, `SCHEMA` to programs."""

from pathlib import Path

from shaftcore.shaft_file.reading import read_shaft, shaft_from_bytes, shaft_from_text
from shaftcore.shaft_file.writing import shaft_to_text, write_shaft

PAGE = Path(__file__).parents[1] / "SHAFT_FILE.md"
SCHEMA = Path(__file__).parents[1] / "shaft_file.schema.json"

__all__ = ["PAGE", "SCHEMA", "read_shaft", "shaft_from_bytes", "shaft_from_text", "shaft_to_text", "write_shaft"]
