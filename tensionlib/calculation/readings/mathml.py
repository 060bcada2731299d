"""LaTeX of a record as MathML, which browsers set by themselves: no script, no network."""

from __future__ import annotations

import re
from functools import lru_cache
from html import escape

_TOKEN = re.compile(r"\\[A-Za-z]+|\\.|\d+(?:\.\d+)?|\s+|.", re.DOTALL)
_COMMANDS = (
    "alpha beta gamma delta epsilon zeta eta theta iota kappa lambda mu nu xi pi rho sigma tau"
    " upsilon phi chi psi omega Gamma Delta Theta Lambda Xi Pi Sigma Phi Psi Omega varphi"
    " varepsilon ell infty"
)
_GLYPHS = "αβγδϵζηθικλμνξπρστυϕχψωΓΔΘΛΞΠΣΦΨΩφεℓ∞"
_LETTERS = {f"\\{name}": glyph for name, glyph in zip(_COMMANDS.split(), _GLYPHS, strict=True)}
_NAMES = (r"\min", r"\max", r"\lim", r"\sin", r"\cos", r"\tan", r"\ln", r"\log", r"\exp")
_OPERATORS = {
    **{sign: sign for sign in "+=<>/,;:*|'"},
    "-": "−",
    r"\cdot": "⋅",
    r"\times": "×",
    r"\leq": "≤",
    r"\geq": "≥",
    r"\pm": "±",
    r"\approx": "≈",
}
_ACCENTS = {r"\bar": "‾", r"\hat": "^", r"\tilde": "~", r"\dot": "˙", r"\vec": "→"}
_SPACES = {r"\ ": ".25em", r"\,": ".17em", r"\:": ".22em", r"\;": ".28em", r"\quad": "1em"}


class _NotRead(Exception):
    """LaTeX beyond what is read here."""


@lru_cache(maxsize=4096)
def of(latex: str) -> str:
    """One `math` element. LaTeX that cannot be read stands in it as it is, so nothing is lost."""
    try:
        content = _Reader(latex).whole()
    except _NotRead:
        content = f"<mtext>{escape(latex)}</mtext>"
    return f'<math displaystyle="true">{content}</math>'


class _Reader:
    """Recursive descent over the LaTeX that records hold, and a little more for users' symbols."""

    def __init__(self, latex: str) -> None:
        self.tokens = _TOKEN.findall(latex)
        self.at = 0

    def whole(self) -> str:
        content = self._row()
        if self.at < len(self.tokens):
            raise _NotRead
        return content

    def _next(self) -> str:
        if self.at >= len(self.tokens):
            raise _NotRead
        self.at += 1
        token: str = self.tokens[self.at - 1]
        return token

    def _peek(self) -> str:
        return self.tokens[self.at] if self.at < len(self.tokens) else ""

    def _row(self) -> str:
        out = []
        while self._peek() not in ("", "}", r"\right"):
            out.append(self._scripted())
        return "".join(out)

    def _scripted(self) -> str:
        base = self._atom()
        scripts = {}
        while self._peek() in ("_", "^"):
            sign = self._next()
            scripts[sign] = self._argument()
        if len(scripts) == 2:
            return f"<msubsup>{base}{scripts['_']}{scripts['^']}</msubsup>"
        for sign, tag in (("_", "msub"), ("^", "msup")):
            if sign in scripts:
                return f"<{tag}>{base}{scripts[sign]}</{tag}>"
        return base

    def _argument(self) -> str:
        while self._peek().isspace():
            self._next()
        return self._atom()

    def _group(self) -> str:
        content = self._row()
        if self._next() != "}":
            raise _NotRead
        return f"<mrow>{content}</mrow>"

    def _words(self) -> str:
        if self._next() != "{":
            raise _NotRead
        words = []
        while (token := self._next()) != "}":
            words.append(token)
        return escape("".join(words))

    def _atom(self) -> str:
        token = self._next()
        if token.isspace():
            return ""
        if token[0].isdigit():
            return f"<mn>{token}</mn>"
        if token.isalpha():
            return f"<mi>{token}</mi>"
        if token in _LETTERS:
            return f"<mi>{_LETTERS[token]}</mi>"
        if token in _NAMES:
            return f"<mi>{token[1:]}</mi>"
        if token in _OPERATORS:
            # A sign with a blank after it adds, also where it opens a term; one without is a sign.
            sums = ' form="infix"' if token in "+-" and self._peek().isspace() else ""
            return f"<mo{sums}>{escape(_OPERATORS[token])}</mo>"
        if token in _SPACES:
            return f'<mspace width="{_SPACES[token]}"/>'
        if token in ("(", ")", "[", "]"):
            return f'<mo stretchy="false">{token}</mo>'
        if token == "{":
            return self._group()
        if token in (r"\text", r"\textrm"):
            return f"<mtext>{self._words()}</mtext>"
        if token in (r"\mathrm", r"\operatorname"):
            return f'<mi mathvariant="normal">{self._words()}</mi>'
        if token == r"\frac":
            return f"<mfrac>{self._argument()}{self._argument()}</mfrac>"
        if token == r"\sqrt":
            return f"<msqrt>{self._argument()}</msqrt>"
        if token in _ACCENTS:
            return f'<mover accent="true">{self._argument()}<mo>{_ACCENTS[token]}</mo></mover>'
        if token == r"\left":
            return self._fenced()
        raise _NotRead

    def _fenced(self) -> str:
        left, content = self._next(), self._row()
        if self._next() != r"\right":
            raise _NotRead
        right = self._next()
        if left + right not in ("()", "[]", "||"):
            raise _NotRead
        kind = 'fence="true" stretchy="true"'
        return (
            f'<mrow><mo form="prefix" {kind}>{left}</mo>{content}'
            f'<mo form="postfix" {kind}>{right}</mo></mrow>'
        )
