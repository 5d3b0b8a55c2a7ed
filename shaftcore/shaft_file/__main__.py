"""Write the schema and the page that describe shaft files anew: ``python -m shaftcore.shaft_file``."""

from shaftcore.shaft_file import PAGE, SCHEMA
from shaftcore.shaft_file.page import page_text
from shaftcore.shaft_file.schema import schema_text

SCHEMA.write_text(schema_text(), encoding="utf-8", newline="\n")
PAGE.write_text(page_text(), encoding="utf-8", newline="\n")
