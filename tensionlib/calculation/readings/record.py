"""The record: a calculation as plain data, from which every other reading is made."""

from __future__ import annotations

import math
from collections.abc import Callable
from typing import TYPE_CHECKING, Any

from tensionlib.calculation.sheet import (
    CheckLine,
    Extreme,
    Fixed,
    Given,
    Holds,
    Line,
    NotCovered,
    Note,
    Step,
    Upto,
)
from tensionlib.calculation.symbols import Symbol
from tensionlib.quantities import (
    LINE_FIGURES,
    SUMMARY_FIGURES,
    format_utilisation,
    format_value,
    latex_value,
)

if TYPE_CHECKING:
    from tensionlib.calculation.formula import Constant
    from tensionlib.calculation.result import Calculation, Check

FORMAT = "tensionlib"
VERSION = 1

Row = dict[str, Any]


def of(calc: Calculation) -> Row:
    """The whole record of a calculation."""
    page = _Page(calc)
    heading = calc.heading
    return {
        "format": FORMAT,
        "version": VERSION,
        "kind": "calculation",
        "mark": heading.mark,
        "title": heading.title,
        "subject": heading.subject,
        "standard": _standard(calc),
        "headline": headline(calc),
        "force": _force(calc),
        "verdict": _verdict(calc),
        "inputs": page.inputs(),
        "parts": page.parts(),
        "checks": [_check(calc, check) for check in calc.checks] + page.uncovered(),
        "assumptions": list(calc.assumptions),
        "not_checked": list(calc.not_checked),
        "notation": page.notation(),
        "sources": [
            {"name": source.name, "use": use, "known": source.known} for source, use in calc.sources
        ],
        "sketches": [
            {"title": sketch.title, "svg": sketch.svg, "alt": sketch.alt}
            for sketch in (calc.draw() if calc.draw else ())
        ],
        "values": page.values(),
        "provenance": {"version": calc.version, "inputs_hash": calc.inputs_hash},
    }


def headline(calc: Calculation) -> str:
    """Mark, section, force, verdict, governing check, clause and utilisation in one line."""
    heading = calc.heading
    about = [heading.subject] if heading.subject else []
    if heading.force is not None:
        symbol = calc.sheet.lines[heading.force].symbol
        assert symbol is not None
        about.append(f"{symbol.text} = {_force(calc)}")
    text = heading.mark + (": " + ", ".join(about) if about else "")
    if not calc.word:
        return text
    text += f": {calc.word}"
    if calc.not_covered and calc.word == "NOT COVERED":
        missing = calc.not_covered[0]
        return f"{text}, {missing.title} ({missing.clause})"
    governing = calc.governing
    if governing is None:
        return text
    by = "governed by" if calc.word == "PASS" else "by"
    return (
        f"{text}, {by} {_named(governing)} ({governing.clause}),"
        f" utilisation {format_utilisation(governing.utilisation)}"
    )


def _force(calc: Calculation) -> str:
    """The design force as summaries print it; "" for a working without one."""
    index = calc.heading.force
    if index is None:
        return ""
    symbol = calc.sheet.lines[index].symbol
    assert symbol is not None
    return format_value(calc.values[index], symbol.role, calc.view, SUMMARY_FIGURES)


def _named(check: Check) -> str:
    """The check's name, with its part where the name alone would not tell."""
    part = check.part.rpartition(": ")[2]
    if check.kind == "strength" and part not in ("Member", "Net section", "Bolts", "Welds"):
        return f"{part[0].lower()}{part[1:]}: {check.name}"
    return check.name


def _standard(calc: Calculation) -> Row:
    source = calc.heading.standard
    if source is None:
        return {"name": "", "key": ""}
    return {"name": source.name, "short": source.short, "key": calc.heading.standard_key}


def _verdict(calc: Calculation) -> Row:
    governing = calc.governing
    return {
        "passes": calc.passes,
        "word": calc.word,
        "governing": None
        if governing is None
        else {
            "part": governing.part,
            "name": governing.name,
            "label": _named(governing),
            "clause": governing.clause,
            "utilisation": _finite(governing.utilisation),
            "text": format_utilisation(governing.utilisation),
        },
    }


def _finite(number: float) -> float | None:
    """JSON has no NaN and no infinity: those are null, and the text beside says which."""
    return number if math.isfinite(number) else None


def _check(calc: Calculation, check: Check) -> Row:
    demand, capacity = check.demand, check.capacity
    unit = calc.view.unit(demand.role)
    return {
        "part": check.part,
        "name": check.name,
        "clause": check.clause,
        "kind": check.kind,
        "demand": _finite(demand.internal / unit.size),
        "capacity": _finite(capacity.internal / unit.size),
        "unit": unit.ascii,
        "demand_text": format_value(demand.internal, demand.role, calc.view, SUMMARY_FIGURES),
        "capacity_text": format_value(capacity.internal, capacity.role, calc.view, SUMMARY_FIGURES),
        "utilisation": _finite(check.utilisation),
        "utilisation_text": format_utilisation(check.utilisation),
        "verdict": check.verdict,
        "note": _why(check),
    }


def _why(check: Check) -> str:
    """The check's note, and the reason where a number made it fail by itself."""
    reasons = [check.note] if check.note else []
    if math.isnan(check.utilisation):
        reasons.append("a number is missing, so the check fails")
    elif check.capacity.internal <= 0.0 and check.demand.internal != 0.0:
        reasons.append("the capacity is zero or less, so the check fails")
    return "; ".join(reasons)


class _Page:
    """Writes the lines of one calculation in its view."""

    def __init__(self, calc: Calculation) -> None:
        self.calc = calc
        self.lines = calc.sheet.lines
        self.values_ = calc.values
        self._verdicts = {(c.part, c.name): c.verdict for c in calc.checks}
        self._latex = [self._valued(i, latex_value) for i in range(len(self.lines))]
        self._text = [self._valued(i, format_value) for i in range(len(self.lines))]

    def _valued(self, index: int, write: Callable[..., str]) -> str:
        symbol = self.lines[index].symbol
        if symbol is None:
            return ""
        return write(self.values_[index], symbol.role, self.calc.view, LINE_FIGURES)

    def _symbol(self, index: int) -> Symbol:
        symbol = self.lines[index].symbol
        assert symbol is not None
        return symbol

    # Parts of the record ------------------------------------------------------------------

    def inputs(self) -> list[Row]:
        return [
            {
                "part": line.part,
                "symbol": symbol.text,
                "latex": symbol.latex,
                "meaning": symbol.meaning,
                "text": self._text[i],
                "latex_value": self._latex[i],
                "origin": self.calc.origins[i],
                **self._number(i),
            }
            for i, line in enumerate(self.lines)
            if isinstance(line, Given) and (symbol := line.symbol)
        ]

    def parts(self) -> list[Row]:
        parts: dict[str, list[Row]] = {}
        for i, line in enumerate(self.lines):
            if not isinstance(line, Given):
                parts.setdefault(line.part, []).append(self._line(i, line))
        return [{"title": title, "lines": lines} for title, lines in parts.items()]

    def uncovered(self) -> list[Row]:
        return [
            {
                "part": line.part,
                "name": line.title,
                "clause": line.clause,
                "kind": "not covered",
                "demand": None,
                "capacity": None,
                "unit": "",
                "demand_text": "",
                "capacity_text": "",
                "utilisation": None,
                "utilisation_text": "",
                "verdict": "not covered",
                "note": line.note,
            }
            for line in self.lines
            if isinstance(line, NotCovered)
        ]

    def notation(self) -> list[Row]:
        seen: dict[tuple[str, str], Row] = {}
        for line in self.lines:
            if symbol := line.symbol:
                # A user's symbol may print like one of the standard's and mean another thing.
                seen.setdefault(
                    (symbol.latex, symbol.meaning),
                    {
                        "symbol": symbol.text,
                        "latex": symbol.latex,
                        "meaning": symbol.meaning,
                        "unit": self.calc.view.unit(symbol.role).name,
                    },
                )
        return list(seen.values())

    def values(self) -> Row:
        """Values by symbol; where a symbol stands again its part follows in brackets."""
        found: Row = {}
        for i, line in enumerate(self.lines):
            if line.symbol:
                name = line.symbol.text
                if name in found:
                    name = f"{name} ({line.part})"
                while name in found:
                    name += "'"
                found[name] = self._number(i)
        return found

    def _number(self, index: int) -> Row:
        unit = self.calc.view.unit(self._symbol(index).role)
        return {"value": _finite(self.values_[index] / unit.size), "unit": unit.ascii}

    # Lines --------------------------------------------------------------------------------

    def _line(self, index: int, line: Line) -> Row:
        row: Row = {
            "kind": _KINDS[type(line)],
            "title": line.title,
            "symbol": "",
            "latex": "",
            "steps": [],
            "text": line.title,
            "clause": line.clause,
            "note": line.note,
        }
        if line.symbol is not None:
            row |= {"symbol": line.symbol.text, "latex": line.symbol.latex, **self._number(index)}
            steps, texts = self._steps(index, line)
            row["steps"] = [*steps, self._latex[index]]
            row["text"] = " = ".join([line.symbol.text, *texts, self._text[index]])
        row |= _WRITERS.get(type(line), _plain)(self, index, line)
        return row

    def _steps(self, index: int, line: Line) -> tuple[list[str], list[str]]:
        """Right-hand sides before the result, as LaTeX and as text: symbols, then numbers."""
        if isinstance(line, Step):
            return self._formula(index, line)
        if isinstance(line, Extreme):
            name = "min" if line.least else "max"
            symbols = [self._symbol(i) for i in line.args]
            if len(symbols) == 1:
                return [symbols[0].latex], [symbols[0].text]
            return (
                [
                    _call(name, [s.latex for s in symbols]),
                    _call(name, self._pick(self._latex, line)),
                ],
                [
                    f"{name}({'; '.join(s.text for s in symbols)})",
                    f"{name}({'; '.join(self._pick(self._text, line))})",
                ],
            )
        return [], []

    def _pick(self, texts: list[str], line: Extreme) -> list[str]:
        return [texts[i] for i in line.args]

    def _formula(self, index: int, line: Step) -> tuple[list[str], list[str]]:
        formula = line.formula
        template = formula.template
        latex_symbols, text_symbols, latex_numbers, text_numbers = ({}, {}, {}, {})
        for name, arg in zip(formula.parameters, line.args, strict=True):
            symbol = self._symbol(arg)
            latex_symbols[name], text_symbols[name] = symbol.latex, symbol.text
            latex_numbers[name], text_numbers[name] = self._latex[arg], self._text[arg]
        for name, constant in formula.constants.items():
            shown = self._constant(constant)
            latex_symbols[name] = latex_numbers[name] = shown[0]
            text_symbols[name] = text_numbers[name] = shown[1]
        numeric = template.numeric(latex_numbers)
        own = formula.function.__module__.startswith("tensionlib.")
        if not own and math.isfinite(self.values_[index]):
            self._prove(index, line, numeric)
        return (
            [template.symbolic(latex_symbols), numeric],
            [template.text_symbolic(text_symbols), template.text_numeric(text_numbers)],
        )

    def _constant(self, constant: Constant) -> tuple[str, str]:
        value, role, view = float(constant), constant.role, self.calc.view
        return latex_value(value, role, view), format_value(value, role, view)

    def _prove(self, index: int, line: Step, numeric: str) -> None:
        """Read a user's formula back from its picture; the library's own are proven in tests."""
        from tensionlib.calculation.readback import check_line

        check_line(
            numeric,
            self._latex[index],
            {unit.latex: unit.size for unit in self._units(line, index)},
        )

    def _units(self, line: Step, index: int) -> list[Any]:
        roles = [self._symbol(i).role for i in (*line.args, index)]
        roles += [constant.role for constant in line.formula.constants.values()]
        return [self.calc.view.unit(role) for role in roles]

    def write_fixed(self, index: int, line: Fixed) -> Row:
        return {"note": _join(line.note, line.source), "source": line.source}

    def write_upto(self, index: int, line: Upto) -> Row:
        by = self._symbol(line.by)
        bands = line.table.rows[line.row]
        which = line.table.band(line.row, self.values_[line.by])

        def write(limit: float) -> str:
            return format_value(limit, by.role, self.calc.view)

        said = [f"at {self._text[line.by]}"]
        if which > 0:
            before = bands[which - 1]
            said.append(f"{'over' if before.closed else 'from'} {write(before.limit)}")
        if math.isfinite(bands[which].limit):
            said.append(
                f"{'up to' if bands[which].closed else 'under'} {write(bands[which].limit)}"
            )
        return {"note": f"{line.row}: {', '.join(said)} ({line.source})"}

    def write_extreme(self, index: int, line: Extreme) -> Row:
        if len(line.args) == 1:
            return {"note": line.note}
        ruling = line.ruling(self.values_)
        title = self.lines[ruling].title
        return {
            "note": _join(line.note, f"what rules: {title}"),
            "ruling": self._symbol(ruling).text,
        }

    def write_holds(self, index: int, line: Holds) -> Row:
        condition = line.condition
        sign, latex_sign = condition.sign if line.decision else condition.opposite
        args = dict(zip(condition.parameters, line.args, strict=True))

        def side(name: str) -> tuple[str, str, str, str]:
            if name in args:
                symbol = self._symbol(args[name])
                return symbol.latex, symbol.text, self._latex[args[name]], self._text[args[name]]
            latex, text = self._constant(condition.constants[name])
            return latex, text, latex, text

        left, right = side(condition.left), side(condition.right)
        tested = f"{left[1]} = {left[3]} {sign} " + (
            right[1] if right[1] == right[3] else f"{right[1]} = {right[3]}"
        )
        return {
            "steps": [f"{left[0]} {latex_sign} {right[0]}", f"{left[2]} {latex_sign} {right[2]}"],
            "text": tested,
            "note": line.consequence,
        }

    def write_check(self, index: int, line: CheckLine) -> Row:
        holds = self.values_[index] <= 1.0
        sign, latex_sign = ("≤", r"\leq") if holds else (">", ">")
        first, second = self._symbol(line.demand), self._symbol(line.capacity)
        used = format_utilisation(self.values_[index])
        return {
            "steps": [
                f"{first.latex} {latex_sign} {second.latex}",
                f"{self._latex[line.demand]} {latex_sign} {self._latex[line.capacity]}",
            ],
            "text": f"{first.text} = {self._text[line.demand]} {sign}"
            f" {second.text} = {self._text[line.capacity]}",
            "utilisation_text": used,
            "verdict": self._verdicts[line.part, line.title],
            "check_kind": line.kind,
        }


def _plain(page: _Page, index: int, line: Any) -> Row:
    return {}


def _call(name: str, arguments: list[str]) -> str:
    return "\\" + name + r"\left(" + r",\ ".join(arguments) + r"\right)"


def _join(*parts: str) -> str:
    return "; ".join(part for part in parts if part)


_KINDS: dict[type[Line], str] = {
    Given: "given",
    Step: "formula",
    Fixed: "fixed",
    Upto: "upto",
    Extreme: "extreme",
    Holds: "holds",
    CheckLine: "check",
    Note: "note",
    NotCovered: "not covered",
}
_WRITERS: dict[type[Line], Callable[[_Page, int, Any], Row]] = {
    Fixed: _Page.write_fixed,
    Upto: _Page.write_upto,
    Extreme: _Page.write_extreme,
    Holds: _Page.write_holds,
    CheckLine: _Page.write_check,
}
