"""Tests run without a screen unless the caller names a Qt platform."""

import os

os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")
