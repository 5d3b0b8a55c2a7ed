"""The one colour scale of stress and utilisation: cividis, even to the eye and safe for the colour-blind.

Cividis: J. R. Nuñez, C. R. Anderton, R. S. Renslow, PLoS ONE 13(7), 2018. Every fourth of its 256
colours stands here; those between are interpolated, which no eye can tell from the full table.
"""

import numpy as np
from numpy.typing import NDArray

from shaftcore.notches._contract import Array

_ANCHORS = (
    "00224e 002554 00285b 002b62 002e6a 003070 053371 123570 1a386f 213b6e 273e6e 2d416d 32436d "
    "36466c 3b496c 3f4c6c 434e6c 47516c 4b546c 4f576c 535a6d 565c6d 5a5f6e 5e626e 61656f 656870 "
    "686a71 6c6d72 6f7073 727374 767676 797977 7d7c78 807f78 848279 888578 8c8878 908b78 938e78 "
    "979177 9b9476 9f9775 a39a74 a79d73 aba072 afa471 b4a76f b8aa6e bcae6c c0b16a c4b468 c8b866 "
    "cdbb63 d1bf61 d5c25e dac65b dec958 e2cd54 e7d150 ebd44b f0d846 f5dc41 f9e03a fee434 fee838"
)
TOP = 1.25
"""Utilisation at the bright end; more is shown as that colour."""
COLOURS = 256


def _table() -> NDArray[np.uint32]:
    anchors = np.array([[int(code[i : i + 2], 16) for i in (0, 2, 4)] for code in _ANCHORS.split()], dtype=float)
    at = np.minimum(np.arange(len(anchors)) * 4, COLOURS - 1)
    red, green, blue = (np.rint(np.interp(np.arange(COLOURS), at, anchors[:, i])).astype(np.uint32) for i in range(3))
    return np.uint32(0xFF000000) | (red << np.uint32(16)) | (green << np.uint32(8)) | blue


TABLE = _table()
"""The colours as 0xAARRGGBB, from utilisation 0 to `TOP`."""


def colours_of(utilisation: Array) -> NDArray[np.uint32]:
    """0xAARRGGBB for each utilisation (any shape); beyond the ends the end colours."""
    share = np.clip(np.nan_to_num(utilisation, posinf=TOP) / TOP, 0.0, 1.0)
    return TABLE[np.rint(share * (COLOURS - 1)).astype(np.intp)]
