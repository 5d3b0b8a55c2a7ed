"""How often costly work may be done while something moves."""

import time
from collections.abc import Callable


class Pace:
    """Lets work through once an interval (s). It holds a time and no lock, so it cannot jam."""

    def __init__(self, interval: float, clock: Callable[[], float] = time.monotonic) -> None:
        self.interval, self._clock = interval, clock
        self._last = -float("inf")

    def take(self) -> bool:
        """True, and the interval begins, where the last time is long enough ago."""
        now = self._clock()
        if now - self._last < self.interval:
            return False
        self._last = now
        return True
