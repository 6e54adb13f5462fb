"""How messages about a job's files are worded, so that every reader of them says the same thing the same way."""

from __future__ import annotations

import difflib
import unicodedata
from collections.abc import Iterable, Sequence
from pathlib import Path

from calcpack.errors import Problem, TableError

__all__ = ["did_you_mean", "failure", "hidden_character", "one_of", "read_text", "shown"]


def one_of(words: Iterable[str]) -> str:
    """The allowed words as a phrase: ``'A' or 'B'``."""
    quoted = [repr(word) for word in words]
    return " or ".join(filter(None, [", ".join(quoted[:-1]), quoted[-1]]))


def did_you_mean(word: str, known: Sequence[str]) -> str:
    """A question naming the known word that `word` comes closest to, or an empty string."""
    folded = {each.casefold(): each for each in known}
    close = difflib.get_close_matches(word[:80].casefold(), list(folded), n=1)
    return f"did you mean {folded[close[0]]!r}?" if close else ""


def shown(value: object) -> str:
    """A value as an error quotes it: on one line, control characters spelled out, a long one cut."""
    text = repr(value) if isinstance(value, str) else str(value)
    return text if len(text) <= 80 else f"{text[:76]}…{text[-1]}"


def hidden_character(text: str) -> str:
    """The first control character or line separator in `text`, spelled ``U+0007``, or an empty string."""
    for character in text:
        if unicodedata.category(character) in {"Cc", "Zl", "Zp"}:
            return f"U+{ord(character):04X}"
    return ""


def read_text(path: Path, file: str) -> str:
    """The text of a UTF-8 file, with or without a byte order mark; `file` is what errors call it.

    Raises
    ------
    TableError : the file cannot be read, or is in another encoding
    """
    try:
        return path.read_bytes().decode("utf-8-sig")
    except OSError as error:
        problem = Problem(f"the file cannot be read ({error.strerror})", "a readable file", "", file)
    except UnicodeDecodeError as error:
        problem = Problem(
            f"byte {error.start + 1} is not UTF-8", "text in UTF-8", "save the file again with the encoding UTF-8", file
        )
    raise failure(file, [problem])


def failure(file: str, problems: Sequence[Problem]) -> TableError:
    """Everything found in a file, as the one error to raise."""
    return TableError(f"{file}: {len(problems)} problem{'s' if len(problems) > 1 else ''}", problems)
