"""The registry: every kind of raiser the program knows. A new kind is entered here and nowhere else."""

from shaftcore.notches import groove, shoulder
from shaftcore.notches._contract import RaiserKind

KINDS: dict[str, RaiserKind] = {kind.key: kind for kind in (shoulder.KIND, groove.KIND)}

Raiser = groove.Groove
RAISER_RECORDS: tuple[type, ...] = (groove.Groove,)
