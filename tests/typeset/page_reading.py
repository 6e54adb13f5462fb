"""Reads what a page shows, as a reader would, and works it: written apart from the code that sets the page.

MathML, Typst and plain text become one list of tokens in reading order. Nothing groups but what the eye sees: round
brackets, bars, a fraction's bar, a root's roof, a raised exponent (which belongs to the one thing before it).
"""

from __future__ import annotations

import math
import re
from collections.abc import Mapping
from typing import Any
from xml.etree import ElementTree

Token = tuple[str, Any]

_RAISED = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻", "0123456789-")
_PRINTED = re.compile(r"(−?)([\d,]*\.?\d+)(?:×10([⁰¹²³⁴⁵⁶⁷⁸⁹⁻]+))?(?:[ \xa0\u202f]([^\d].*))?$")
_FUNCTIONS = {
    "ln": math.log, "log₁₀": math.log10, "min": min, "max": max, "sin": math.sin, "cos": math.cos, "tan": math.tan,
    "exp": math.exp, "asin": math.asin, "acos": math.acos, "atan": math.atan, "atan2": math.atan2, "ceil": math.ceil,
    "floor": math.floor, "hypot": math.hypot,
}  # fmt: skip
_RELATIONS = {
    "<": float.__lt__,
    ">": float.__gt__,
    "≤": float.__le__,
    "≥": float.__ge__,
    "=": float.__eq__,
    "≠": float.__ne__,
}


def printed_number(text: str) -> float:
    """The number that a text with separators, powers of ten and a unit stands for."""
    if text == "π":
        return math.pi
    match = _PRINTED.match(text)
    assert match is not None, f"no number: {text!r}"
    size = float(f"{match[2].replace(',', '')}e{match[3].translate(_RAISED) if match[3] else 0}")
    return -size if match[1] else size


# MathML


def mathml(text: str) -> list[Token]:
    """Tokens of a row of MathML."""
    return _elements(list(ElementTree.fromstring(f"<math>{text}</math>")))


def _elements(elements: list[ElementTree.Element]) -> list[Token]:
    return [token for element in elements for token in _element(element)]


def _element(element: ElementTree.Element) -> list[Token]:
    parts = list(element)
    match element.tag:
        case "mrow":
            return _elements(parts)
        case "mn":
            link = element.find("a")
            return [("number", (link if link is not None else element).text)]
        case "mi":
            return [("name", element.text)]
        case "mo":
            return [("sign", {"\u2062": "·", "\u2061": "of"}.get(element.text or "", element.text))]
        case "mtext":
            return [("word", element.text)]
        case "mspace":
            return []
        case "mfrac":
            return [("fraction", tuple(_element(part) for part in parts))]
        case "msqrt":
            return [("root", _elements(parts))]
        case "msub":
            return [("name", f"{parts[0].text}_{parts[1].text}")]
        case "msubsup":
            return [("name", f"{parts[0].text}{parts[2].text}_{parts[1].text}")]
        case "msup" if parts[1].tag == "mo":
            return [("name", f"{parts[0].text}{parts[1].text}")]
        case "msup":
            return [*_element(parts[0]), ("raised", _element(parts[1]))]
    raise AssertionError(f"unexpected element {element.tag}")


# Typst

_TYPST = re.compile(
    r'\s*(?:#v\((?P<value>(?:"[^"]*"(?:, )?)+)\)|"(?P<quoted>[^"]*)"'
    r"|(?P<word>dot\.op|[^\W\d_]+|\d+)(?P<tail>'*(?:_(?:\"[^\"]*\"|\w))?)"
    r"|(?P<sign><=|>=|!=|[-+<>=(),:]))"
)
_TYPST_SIGNS = {"dot.op": "·", "comma": ",", "thin": "·", "-": "−", "<=": "≤", ">=": "≥", "!=": "≠"}


def typst(text: str) -> list[Token]:
    """Tokens of a row of Typst mathematics."""
    pieces: list[re.Match[str]] = []
    position = 0
    text = text.strip()
    while position < len(text):
        match = _TYPST.match(text, position)
        assert match is not None, f"cannot read {text[position : position + 30]!r}"
        pieces.append(match)
        position = match.end()
    tokens, rest = _typst_row(pieces)
    assert not rest
    return tokens


def _typst_row(pieces: list[re.Match[str]]) -> tuple[list[Token], list[re.Match[str]]]:
    tokens: list[Token] = []
    while pieces and pieces[0]["sign"] not in (")", ",", ":"):
        found, pieces = _typst_piece(pieces)
        tokens += found
    return tokens, pieces


def _typst_piece(pieces: list[re.Match[str]]) -> tuple[list[Token], list[re.Match[str]]]:
    piece, rest = pieces[0], pieces[1:]
    if piece["value"]:
        return [("number", re.findall('"([^"]*)"', piece["value"])[1])], rest
    if piece["quoted"] is not None:
        return [_quoted(piece["quoted"])], rest
    if piece["sign"]:
        return [("sign", _TYPST_SIGNS.get(piece["sign"], piece["sign"]))], rest
    word = piece["word"]
    if word in ("frac", "sqrt", "attach", "abs", "lr", "op", "class") and rest and rest[0]["sign"] == "(":
        return _typst_call(word, rest[1:])
    if word == "space":
        return [], rest
    if word in _TYPST_SIGNS:
        return [("sign", _TYPST_SIGNS[word])], rest
    primes, subscript = piece["tail"].count("'"), piece["tail"].partition("_")[2].strip('"')
    return [("name", f"{word}{'′' * primes}{'_' * bool(subscript)}{subscript}")], rest


def _quoted(text: str) -> Token:
    if text == ",":
        return ("sign", ",")
    if text in ("and", "or"):
        return ("word", text)
    return ("number", text) if re.match(r"[−\d.]", text) else ("name", text)


def _typst_call(word: str, pieces: list[re.Match[str]]) -> tuple[list[Token], list[re.Match[str]]]:
    if word == "lr":
        assert pieces[0]["sign"] == "("
        inner, pieces = _typst_row(pieces[1:])
        assert [piece["sign"] for piece in pieces[:2]] == [")", ")"]
        return [("sign", "("), *inner, ("sign", ")")], pieces[2:]
    if word == "class":
        # Typst is told that a sign which opens a row stands between two things.
        inner, pieces = _typst_row(pieces[2:])
        return inner, pieces[1:]
    if word == "op":
        assert pieces[1]["sign"] == ")"
        return [("name", pieces[0]["quoted"]), ("sign", "of")], pieces[2:]
    parts: list[list[Token]] = []
    while True:
        part, pieces = _typst_row(pieces)
        if pieces[0]["sign"] == ":":
            assert part == [("name", "t")]
            part, pieces = _typst_row(pieces[1:])
        parts.append(part)
        closing, pieces = pieces[0]["sign"], pieces[1:]
        if closing == ")":
            break
    if word == "abs":
        return [("sign", "|"), *parts[0], ("sign", "|")], pieces
    if word == "sqrt":
        return [("root", parts[0])], pieces
    if word == "frac":
        return [("fraction", tuple(parts))], pieces
    return [*parts[0], ("raised", parts[1])], pieces


# Plain text

_PLAIN = re.compile(
    r"\s*(?:(?P<number>(?:[\d,]*\.?\d+)(?:×10[⁰¹²³⁴⁵⁶⁷⁸⁹⁻]+)?)|(?P<name>log₁₀|[^\W\d]\w*|π)|(?P<sign>[-−+·/^√()|,<>≤≥=≠]))"
)


def plain(text: str) -> list[Token]:
    """Tokens of a row of plain text whose numbers have no units."""
    tokens: list[Token] = []
    position = 0
    text = text.strip()
    while position < len(text):
        match = _PLAIN.match(text, position)
        assert match is not None, f"cannot read {text[position:]!r}"
        position = match.end()
        kind = str(match.lastgroup)
        if (
            tokens
            and (tokens[-1][0] in ("number", "name") or tokens[-1][1] == ")")
            and ((kind in ("number", "name") and match[kind] not in ("and", "or")) or match[kind] in ("(", "√"))
        ):
            tokens.append(("sign", "·"))  # side by side
        if kind == "name" and match[kind] in _FUNCTIONS:
            tokens += [("name", match[kind]), ("sign", "of")]
        elif kind == "name" and match[kind] in ("and", "or"):
            tokens.append(("word", match[kind]))
        else:
            tokens.append((kind, match[kind]))
    return tokens


# Reading the tokens


def split_at_equals(tokens: list[Token]) -> list[list[Token]]:
    """The parts of a row between its equals signs; what stands before the first is left out when empty."""
    parts: list[list[Token]] = [[]]
    for token in tokens:
        if token == ("sign", "="):
            parts.append([])
        else:
            parts[-1].append(token)
    return parts[1:] if not parts[0] else parts


def worked(tokens: list[Token], symbols: Mapping[str, float] | None = None) -> float:
    """The value of a row as a reader works it out."""
    reader = _Row(tokens, symbols or {})
    value = reader.sum()
    assert reader.at == len(tokens), f"left over: {tokens[reader.at :]}"
    return value


def holds(tokens: list[Token], symbols: Mapping[str, float] | None = None) -> bool:
    """Whether a condition holds as a reader reads it: 'and' before 'or'."""
    reader = _Row(tokens, symbols or {})
    truth = reader.any_of()
    assert reader.at == len(tokens), f"left over: {tokens[reader.at :]}"
    return truth


class _Row:
    def __init__(self, tokens: list[Token], symbols: Mapping[str, float]) -> None:
        self.tokens = tokens
        self.symbols = symbols
        self.at = 0

    def next(self) -> Token:
        return self.tokens[self.at] if self.at < len(self.tokens) else ("end", "")

    def accept(self, *wanted: str) -> str:
        kind, text = self.next()
        if kind in ("sign", "word") and text in wanted:
            self.at += 1
            return str(text)
        return ""

    def any_of(self) -> bool:
        truth = self.all_of()
        while self.accept("or"):
            truth = self.all_of() or truth
        return truth

    def all_of(self) -> bool:
        truth = self.relation()
        while self.accept("and"):
            truth = self.relation() and truth
        return truth

    def relation(self) -> bool:
        start = self.at
        if self.accept("("):
            try:
                truth = self.any_of()
                assert self.accept(")")
            except AssertionError:
                self.at = start
            else:
                return truth
        left, truth = float(self.sum()), True
        sign = self.accept(*_RELATIONS)
        assert sign
        while sign:
            right = float(self.sum())
            truth = truth and bool(_RELATIONS[sign](left, right))
            left, sign = right, self.accept(*_RELATIONS)
        return truth

    def sum(self) -> float:
        value = -self.product() if self.accept("−") else self.product(first=True)
        while sign := self.accept("+", "−"):
            value = value + self.product() if sign == "+" else value - self.product()
        return value

    def product(self, first: bool = False) -> float:
        value = self.power(first)
        while sign := self.accept("·", "/"):
            value = value * self.power() if sign == "·" else value / self.power()
        return value

    def power(self, first: bool = False) -> float:
        text = str(self.next()[1])
        value = self.atom(first)
        if self.next()[0] == "raised" or self.next() == ("sign", "^"):
            exponent = self.exponent()
            assert not re.search(r"[ \xa0\u202f×]", text) or not re.match(r"[−\d]", text), (
                f"{text!r} raised without brackets"
            )
            return -float(math.pow(-value, exponent)) if text.startswith("−") else math.pow(value, exponent)
        return value

    def exponent(self) -> float:
        kind, inner = self.next()
        self.at += 1
        if kind == "raised":
            return worked(inner, self.symbols)
        return -self.power() if self.accept("−") else self.power()

    def atom(self, first: bool = False) -> float:
        kind, inner = self.next()
        self.at += 1
        if kind == "number":
            assert first or not inner.startswith("−"), "a negative number after an operator needs brackets"
            return printed_number(inner)
        if kind == "fraction":
            return worked(inner[0], self.symbols) / worked(inner[1], self.symbols)
        if kind == "root":
            return math.sqrt(worked(inner, self.symbols))
        if (kind, inner) == ("sign", "√"):
            return math.sqrt(self.atom())
        if kind == "sign" and inner in ("(", "|"):
            value = self.sum()
            assert self.accept({"(": ")", "|": "|"}[inner])
            return abs(value) if inner == "|" else value
        if kind == "name" and self.accept("of"):
            return float(_FUNCTIONS[inner](*self.arguments()))
        assert kind == "name", f"unexpected {kind} {inner!r}"
        return math.pi if inner == "π" else self.symbols[inner]

    def arguments(self) -> list[float]:
        assert self.accept("(")
        values = [self.sum()]
        while self.accept(","):
            # Typst sets a thin space after the comma.
            self.accept("·")
            values.append(self.sum())
        assert self.accept(")")
        return values
