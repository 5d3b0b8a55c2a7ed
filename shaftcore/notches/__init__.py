"""Stress raisers: one module a kind, all after the same contract."""
