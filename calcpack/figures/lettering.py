"""The lettering of figures: how wide a text is in the shipped face, and its runs with subscripts."""

from __future__ import annotations

import re
from functools import cache, lru_cache
from typing import Any

from calcpack import fonts

__all__ = ["FAMILY", "SUBSCRIPT", "runs", "text_width"]

# The browser takes the first name; Typst knows the same files under the second, with a condensed stretch.
FAMILY = ("IBM Plex Sans Condensed", "IBM Plex Sans")
SUBSCRIPT = 0.72
_MEASURED = 100.0


def runs(text: str) -> list[tuple[str, bool]]:
    """The text cut into runs, each with whether it is a subscript: ``ℓ_{d} = 3`` gives ``ℓ``, ``d``, `` = 3``."""
    pieces = re.split(r"_\{([^{}]*)\}", text)
    return [(piece, bool(number % 2)) for number, piece in enumerate(pieces) if piece]


@cache
def _face(weight: int) -> Any:
    from matplotlib.ft2font import FT2Font

    face = FT2Font(str(fonts.matplotlib_face(weight)))
    face.set_size(_MEASURED, 72)
    return face


@lru_cache(maxsize=2048)
def _advance(text: str, weight: int) -> float:
    from matplotlib.ft2font import LoadFlags

    face, flags = _face(weight), LoadFlags.NO_HINTING
    # A character of another script is set in another face; the width of a capital is a fair guess.
    known = (ord(c) if face.get_char_index(ord(c)) else ord("M") for c in text)
    return float(sum(face.load_char(code, flags=flags).linearHoriAdvance for code in known)) / 65536


def text_width(text: str, size: float, weight: int = 400) -> float:
    """Width of a text on paper, inches, at `size` points, subscripts at their smaller size."""
    factors = ((piece, SUBSCRIPT if lowered else 1.0) for piece, lowered in runs(text))
    return sum(_advance(piece, weight) * factor for piece, factor in factors) * size / _MEASURED / 72
