"""How LaTeX, MathML, Typst, plain text and speech write the parts of an expression: one small class each."""

from __future__ import annotations

import html
import re
from typing import TYPE_CHECKING

from calcpack.typeset.names import GREEK

if TYPE_CHECKING:
    from calcpack.typeset.emit import Target

__all__ = ["LATEX", "MATHML", "PLAIN", "SPOKEN", "TARGETS", "TYPST"]


class _Latex:
    name = "latex"

    def number(self, text: str) -> str:
        """A number."""
        return text.replace(",", "{,}")

    def value(self, text: str, link: str, sheet: str) -> str:
        """A substituted value and where it was set."""
        number, _, unit = text.partition(" ")
        return self.number(number) + (rf"\ \mathrm{{{unit.replace('·', chr(92) + 'cdot ')}}}" if unit else "")

    def symbol(self, base: str, subscript: str, primes: int) -> str:
        """A symbol with its subscript and primes."""
        greek = {letter: f"\\{name}" for name, letter in GREEK.items()}
        head = greek.get(base, base) + "'" * primes
        return f"{head}_{{{_upright_latex(subscript)}}}" if subscript else f"{head} "

    def sequence(self, parts: list[str]) -> str:
        """Parts side by side."""
        return " ".join(parts)

    def fraction(self, above: str, below: str) -> str:
        """A quotient."""
        return rf"\frac{{{above}}}{{{below}}}"

    def root(self, inner: str) -> str:
        """A square root."""
        return rf"\sqrt{{{inner}}}"

    def power(self, base: str, exponent: str) -> str:
        """A power."""
        return f"{{{base}}}^{{{exponent}}}"

    def bracket(self, inner: str) -> str:
        """Round brackets."""
        return rf"\left({inner}\right)"

    def function(self, name: str, arguments: list[str]) -> str:
        """A function of arguments."""
        if name == "abs":
            return rf"\left|{arguments[0]}\right|"
        known = name if name in ("min", "max", "sin", "cos", "tan", "exp") else None
        head = rf"\{known}" if known else rf"\operatorname{{{_FUNCTION_NAMES.get(name, name)}}}"
        return head + self.bracket(r",\ ".join(arguments))

    def operator(self, sign: str) -> str:
        """An operator or relation."""
        return {"·": r"\cdot", "−": "-", "≤": r"\leq", "≥": r"\geq", "≠": r"\neq", "juxtaposed": r"\,"}.get(sign, sign)

    def continued(self, sign: str) -> str:
        """The operator that a row goes on with."""
        return f"{{}} {self.operator(sign)}"

    def word(self, text: str) -> str:
        """A word between conditions."""
        return rf"\ \text{{{text}}}\ "


def _upright_latex(subscript: str) -> str:
    return subscript if len(subscript) == 1 else rf"\mathrm{{{subscript}}}"


_FUNCTION_NAMES = {"log": "ln", "log10": "log₁₀", "atan2": "atan2", "ceil": "ceil", "floor": "floor"}


class _Mathml:
    name = "mathml"

    def number(self, text: str) -> str:
        """A number."""
        return f"<mn>{_nospace(text)}</mn>"

    def value(self, text: str, link: str, sheet: str) -> str:
        """A substituted value and where it was set."""
        inner = _nospace(html.escape(text))
        beside = f'<span class="from">{html.escape(sheet)}</span>' if sheet else ""
        return f'<mn><a href="#{html.escape(link)}">{inner}</a>{beside}</mn>' if link else f"<mn>{inner}</mn>"

    def symbol(self, base: str, subscript: str, primes: int) -> str:
        """A symbol with its subscript and primes."""
        head, sub = f"<mi>{html.escape(base)}</mi>", f"<mi>{html.escape(subscript)}</mi>"
        if primes:
            mark = f"<mo>{'′' * primes}</mo>"
            return f"<msubsup>{head}{sub}{mark}</msubsup>" if subscript else f"<msup>{head}{mark}</msup>"
        return f"<msub>{head}{sub}</msub>" if subscript else head

    def sequence(self, parts: list[str]) -> str:
        """Parts side by side."""
        return f"<mrow>{''.join(parts)}</mrow>"

    def fraction(self, above: str, below: str) -> str:
        """A quotient."""
        return f"<mfrac>{above}{below}</mfrac>"

    def root(self, inner: str) -> str:
        """A square root."""
        return f"<msqrt>{inner}</msqrt>"

    def power(self, base: str, exponent: str) -> str:
        """A power."""
        return f"<msup>{base}{exponent}</msup>"

    def bracket(self, inner: str) -> str:
        """Round brackets."""
        return f"<mrow><mo>(</mo>{inner}<mo>)</mo></mrow>"

    def function(self, name: str, arguments: list[str]) -> str:
        """A function of arguments."""
        if name == "abs":
            return f"<mrow><mo>|</mo>{arguments[0]}<mo>|</mo></mrow>"
        inner = "<mo>,</mo>".join(arguments)
        return f"<mrow><mi>{_FUNCTION_NAMES.get(name, name)}</mi><mo>&#x2061;</mo>{self.bracket(inner)}</mrow>"

    def operator(self, sign: str) -> str:
        """An operator or relation."""
        if sign == "juxtaposed":
            return '<mo lspace="0.12em" rspace="0">&#x2062;</mo>'
        return f"<mo>{html.escape(sign)}</mo>"

    def continued(self, sign: str) -> str:
        """The operator that a row goes on with."""
        return f'<mo form="infix">{html.escape(sign)}</mo>'

    def word(self, text: str) -> str:
        """A word between conditions."""
        return f"<mspace width='0.4em'/><mtext>{text}</mtext><mspace width='0.4em'/>"


def _nospace(text: str) -> str:
    return text.replace(" ", "\u00a0")


class _Typst:
    name = "typst"

    def number(self, text: str) -> str:
        """A number."""
        return f'"{text}"'

    def value(self, text: str, link: str, sheet: str) -> str:
        """A substituted value and where it was set."""
        text = _nospace(text).replace("\\", "\\\\").replace('"', '\\"')
        if not link:
            return f'"{text}"'
        return f'#v("{link}", "{text}", "{sheet}")' if sheet else f'#v("{link}", "{text}")'

    def symbol(self, base: str, subscript: str, primes: int) -> str:
        """A symbol with its subscript and primes."""
        head = (base if len(base) == 1 else f'"{base}"') + "'" * primes
        if not subscript:
            return head
        return f"{head}_{subscript}" if len(subscript) == 1 else f'{head}_"{subscript}"'

    def sequence(self, parts: list[str]) -> str:
        """Parts side by side."""
        return " ".join(parts)

    def fraction(self, above: str, below: str) -> str:
        """A quotient."""
        return f"frac({above}, {below})"

    def root(self, inner: str) -> str:
        """A square root."""
        return f"sqrt({inner})"

    def power(self, base: str, exponent: str) -> str:
        """A power."""
        return f"attach({base}, t: {exponent})"

    def bracket(self, inner: str) -> str:
        """Round brackets."""
        return f"lr(( {inner} ))"

    def function(self, name: str, arguments: list[str]) -> str:
        """A function of arguments."""
        if name == "abs":
            return f"abs({arguments[0]})"
        inner = " comma ".join(arguments)
        return f'op("{_FUNCTION_NAMES.get(name, name)}") {self.bracket(inner)}'

    def operator(self, sign: str) -> str:
        """An operator or relation."""
        return {"·": "dot.op", "−": "-", "≤": "<=", "≥": ">=", "≠": "!=", "juxtaposed": "thin"}.get(sign, sign)

    def continued(self, sign: str) -> str:
        """The operator that a row goes on with."""
        return f'class("binary", {self.operator(sign)})'

    def word(self, text: str) -> str:
        """A word between conditions."""
        return f'space "{text}" space'


class _Plain:
    name = "plain"

    def number(self, text: str) -> str:
        """A number."""
        return text

    def value(self, text: str, link: str, sheet: str) -> str:
        """A substituted value and where it was set."""
        return text

    def symbol(self, base: str, subscript: str, primes: int) -> str:
        """A symbol with its subscript and primes."""
        return f"{base}{'′' * primes}{subscript}"

    def sequence(self, parts: list[str]) -> str:
        """Parts side by side."""
        return re.sub(r" +", " ", " ".join(parts))

    def fraction(self, above: str, below: str) -> str:
        """A quotient."""
        return f"{_grouped(above, '−')}/{_grouped(below, '/−')}"

    def root(self, inner: str) -> str:
        """A square root."""
        return f"√{_grouped(inner, '/^')}"

    def power(self, base: str, exponent: str) -> str:
        """A power."""
        return f"{base}^{_grouped(exponent, '/−')}"

    def bracket(self, inner: str) -> str:
        """Round brackets."""
        return f"({inner})"

    def function(self, name: str, arguments: list[str]) -> str:
        """A function of arguments."""
        return f"|{arguments[0]}|" if name == "abs" else f"{_FUNCTION_NAMES.get(name, name)}({', '.join(arguments)})"

    def operator(self, sign: str) -> str:
        """An operator or relation."""
        return "" if sign == "juxtaposed" else sign

    def continued(self, sign: str) -> str:
        """The operator that a row goes on with."""
        return self.operator(sign)

    def word(self, text: str) -> str:
        """A word between conditions."""
        return text


def _grouped(text: str, also: str = "") -> str:
    text = text.strip()
    return f"({text})" if any(sign in text for sign in f" {also}") and not _enclosed(text) else text


def _enclosed(text: str) -> bool:
    depth = 0
    for place, letter in enumerate(text):
        depth += (letter == "(") - (letter == ")")
        if not depth:
            return place == len(text) - 1 and letter == ")"
    return False


_SPOKEN_LETTERS = {letter: name for name, letter in GREEK.items()}
_SPOKEN_SIGNS = {
    "·": "times", "−": "minus", "+": "plus", "≤": "at most", "≥": "at least", "≠": "not equal to", "=": "equals",
    "<": "less than", ">": "greater than", "juxtaposed": "times",
}  # fmt: skip


class _Spoken(_Plain):
    name = "spoken"

    def symbol(self, base: str, subscript: str, primes: int) -> str:
        """A symbol with its subscript and primes."""
        letters = "".join(_SPOKEN_LETTERS.get(letter, letter) for letter in subscript.replace(",", " "))
        return " ".join(filter(None, [_SPOKEN_LETTERS.get(base, base), "prime" if primes else "", letters]))

    def fraction(self, above: str, below: str) -> str:
        """A quotient."""
        return f"{_comma(above)} over {_comma(below)}"

    def root(self, inner: str) -> str:
        """A square root."""
        return f"root of {_comma(inner)}"

    def power(self, base: str, exponent: str) -> str:
        """A power."""
        return f"{base} to the power {exponent}"

    def bracket(self, inner: str) -> str:
        """Round brackets."""
        return f"bracket {inner} close"

    def function(self, name: str, arguments: list[str]) -> str:
        """A function of arguments."""
        spoken = {"min": "the lesser of", "max": "the greater of", "abs": "the size of"}.get(name, f"{name} of")
        return f"{spoken} {' and '.join(arguments)}"

    def operator(self, sign: str) -> str:
        """An operator or relation."""
        return _SPOKEN_SIGNS.get(sign, sign)


def _comma(text: str) -> str:
    return f"the quantity {text}," if " " in text else text


LATEX: Target = _Latex()
MATHML: Target = _Mathml()
TYPST: Target = _Typst()
PLAIN: Target = _Plain()
SPOKEN: Target = _Spoken()
TARGETS = {target.name: target for target in (LATEX, MATHML, TYPST, PLAIN, SPOKEN)}
