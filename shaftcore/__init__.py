"""Filletwright's computation: a shaft goes in, margins at every station come out. Knows no window."""

VERSION = "0.1.0"
