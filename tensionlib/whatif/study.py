"""A study: thousands of alternatives of one brief, each equal to its single design."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping, Sequence
from concurrent.futures import Executor
from dataclasses import dataclass
from functools import cached_property
from os import PathLike
from pathlib import Path
from typing import Any, cast

import numpy as np
import numpy.typing as npt

from tensionlib.calculation.inputs import Number
from tensionlib.calculation.result import Calculation
from tensionlib.errors import InputError, TensionlibError
from tensionlib.joints.ends import Bolted, Welded
from tensionlib.members.book import FORCE_KEY
from tensionlib.members.brief import Brief
from tensionlib.members.design import case_of
from tensionlib.members.member import Member, laid_out
from tensionlib.members.pieces import END_NAMES, Piece
from tensionlib.members.resolve import MEMBER_PIECES, REGULAR, is_regular, whole_end
from tensionlib.quantities import FORCE as FORCE_ROLE
from tensionlib.quantities import (
    SUMMARY_FIGURES,
    Quantity,
    door,
    format_number,
    format_utilisation,
)
from tensionlib.standards import standard as find_standard
from tensionlib.whatif.extras import need
from tensionlib.whatif.fields import Fields
from tensionlib.whatif.grid import CANNOT, FAIL, NOT_COVERED, PASS, Grid, Results
from tensionlib.whatif.objectives import Objective, Rates, objective
from tensionlib.whatif.program import Program
from tensionlib.whatif.reading import Reading, Rows
from tensionlib.whatif.tables import Table, at_end, of_piece, table
from tensionlib.whatif.take_off import Term

Kind = type[Bolted] | type[Welded]
LONG = 2_000_000
By = str | Rates | Objective
DEFAULT: tuple[By, ...] = ("mass", "bolts")
WORDS = {CANNOT: "CANNOT BE BUILT", PASS: "PASS", FAIL: "FAIL", NOT_COVERED: "NOT COVERED"}


@dataclass(frozen=True)
class _Stratum:
    """Alternatives whose ends are of the same kinds: some values of some lists.

    `ends` names each distinct end; `regular` its class where it is made of fine pieces, else None.
    """

    fields: Fields
    places: dict[int, list[int]]
    ends: tuple[str, ...]
    regular: tuple[Kind | None, ...]
    alone: bool = False
    """Whether only a single design can tell how many ends differ."""


class Study:
    """Alternatives of a brief: every set of values of its lists. Made by `study`.

    Rows go in the order of the lists, the last one running fastest. Nothing but results is kept
    of a row: the rest is worked out from its number.
    """

    def __init__(self, base: Brief, vary: Mapping[Any, Any]) -> None:
        self.base = base
        self.fields = Fields(base, vary)
        self.shape = tuple(len(axis) for axis in self.fields.axes)
        self._programs: dict[int, tuple[Any, Program]] = {}

    def __len__(self) -> int:
        return int(np.prod(self.shape, dtype=np.int64))

    def __repr__(self) -> str:
        return f"{self.base.member.mark}: {self._counted()}"

    # Working out --------------------------------------------------------------------------

    @cached_property
    def results(self) -> Results:
        """What every row came to."""
        return self.work_out()

    def keep(self, results: Results) -> Study:
        """This study with results worked out elsewhere."""
        self.__dict__["results"] = results
        return self

    def work_out(self, told: Callable[[int], None] = lambda rows: None) -> Results:
        """Work out every row afresh; `told` is called with numbers of rows as they are done."""
        strata = self._strata
        if len(strata) == 1:
            out = Results.empty(len(self))
            self._grid(strata[0]).work_out(out, told)
            return out
        out = Results.empty(len(self))
        for stratum in strata:
            shape = tuple(len(axis) for axis in stratum.fields.axes)
            part = Results.empty(int(np.prod(shape, dtype=np.int64)))
            self._grid(stratum).work_out(part, told)
            merge(out, part, self.shape, stratum.places)
        return out

    @cached_property
    def _strata(self) -> tuple[_Stratum, ...]:
        fields, base = self.fields, self.base
        if not self._two_ends():
            ends: tuple[str, ...] = ("end",)
        elif self._may_be_equal():
            return (_Stratum(fields, {}, ("end", "far_end"), (None, None), alone=True),)
        else:
            ends = ("end", "far_end")
        parts: list[tuple[dict[int, list[int]], tuple[Kind | None, ...]]] = [({}, ())]
        for name in ends:
            number = fields.own(name)
            whole = fields.touches(f"{name}.plate.shape") and number is None
            if number is None:
                kind = self._kind(getattr(base.member, name), whole)
                parts = [(places, (*kinds, kind)) for places, kinds in parts]
                continue
            at = fields.axes[number].names.index(name)
            groups: dict[Any, list[int]] = {}
            for place, option in enumerate(fields.axes[number].options):
                kind = self._kind(option[at], False)
                groups.setdefault((kind, type(option[at])), []).append(place)
            parts = [
                (places | {number: some}, (*kinds, kind))
                for places, kinds in parts
                for (kind, _), some in groups.items()
            ]
        return tuple(_Stratum(fields.part(places), places, ends, kinds) for places, kinds in parts)

    def _kind(self, end: Any, whole: bool) -> Kind | None:
        return type(end) if is_regular(end) and not whole else None

    def _two_ends(self) -> bool:
        return self.base.member.far_end is not None or self.fields.own("far_end") is not None

    def _may_be_equal(self) -> bool:
        """Whether both ends could be the same in some row, which then has one."""
        first, second = self.base.member.end, self.base.member.far_end
        if self.fields.own("end") is not None or self.fields.own("far_end") is not None:
            return True
        if type(first) is not type(second):
            return False
        names = [name for name in self.base.names() if name.startswith("end.")]
        return not any(
            self.base.value(name) != self.base.value(f"far_{name}")
            for name in names
            if name != "end.plate"
            and not self.fields.touches(name)
            and not self.fields.touches(f"far_{name}")
            and f"far_{name}" in self.base.names()
        )

    def _grid(self, stratum: _Stratum) -> Grid:
        fields = stratum.fields
        shape = tuple(len(axis) for axis in fields.axes)

        def walk(row: int) -> tuple[Program, float]:
            calc = fields.brief(_pick(row, shape)).design()
            kept = self._programs.get(id(calc.sheet))
            if kept is None:
                kept = self._programs[id(calc.sheet)] = (calc.sheet, Program(calc.sheet))
            return kept[1], calc.utilisation

        return Grid(shape, self._tables(stratum), walk)

    def _tables(self, stratum: _Stratum) -> list[Table]:
        fields = stratum.fields

        def force(pick: dict[int, int]) -> tuple[dict[str, float], Any]:
            value = fields.value("force", pick)
            return {FORCE_KEY: door("force", value, FORCE_ROLE).internal}, ()

        def which(pick: dict[int, int]) -> tuple[dict[str, float], Any]:
            chosen = fields.value("standard", pick)
            return {}, (chosen.key, chosen.edition)

        found = [table(fields, ("force",), force), table(fields, ("standard",), which)]
        if stratum.alone:
            names = tuple(n for n in self.base.names() if n not in ("force", "standard"))
            return [*found, table(fields, names, lambda pick: _alone(fields.brief(pick)))]
        found += [of_piece(fields, p, "", prefix="member: ") for p in MEMBER_PIECES]
        labels = END_NAMES[len(stratum.ends)]
        for name, kind, (label, prefix) in zip(stratum.ends, stratum.regular, labels, strict=True):
            if kind is None:
                found.append(of_piece(fields, _WHOLE_END, name, label=label, prefix=prefix))
                continue
            same = {"label": label, "prefix": prefix, "kind": str(kind.kind)}
            found += [of_piece(fields, piece, name, **same) for piece in REGULAR[kind]]
        return found

    # What it is compared by ---------------------------------------------------------------

    def measure(self, by: str | Rates | Objective) -> npt.NDArray[np.float64]:
        """An objective of each row, shape (n,), in its unit; NaN where a row cannot be built.

        Raises
        ------
        DataNotFoundError
            For an objective that is not on offer, or bolts without a rate.
        """
        chosen = objective(by)
        out = np.full(self.shape, np.nan)
        for stratum in self._strata:
            shape = tuple(len(axis) for axis in stratum.fields.axes)
            total: Any = np.zeros((1,) * len(shape))
            for axes, values in self._terms(stratum, chosen):
                sizes = [shape[a] if a in axes else 1 for a in range(len(shape))]
                total = total + values.reshape(sizes)
            at = np.ix_(*(stratum.places.get(k, range(n)) for k, n in enumerate(self.shape)))
            out[at] = np.broadcast_to(total, shape) * chosen.scale
        found = out.reshape(-1)
        found[self.verdict == CANNOT] = np.nan
        return found

    def _terms(
        self, stratum: _Stratum, chosen: Objective
    ) -> Iterator[tuple[tuple[int, ...], npt.NDArray[np.float64]]]:
        """The lists each term depends on, and what it is over them; both ends are counted."""
        fields = stratum.fields
        found = [] if chosen.of_member is None else [(chosen.of_member, "", 1.0, "")]
        twice = 2.0 if len(stratum.ends) == 1 else 1.0
        for name, regular in zip(stratum.ends, stratum.regular, strict=True):
            kind = "" if regular is None else regular.kind
            found += [(term, name, twice, kind) for term in chosen.of_end(kind)]
        for term, name, times, kind in found:
            one = _one_number(fields, term, name, kind, times)
            made = table(fields, at_end(term.reads, name), one)
            yield made.axes, made.columns["term"]

    # Results ------------------------------------------------------------------------------

    @property
    def utilisation(self) -> npt.NDArray[np.float64]:
        """Of the governing check of each row, shape (n,); NaN where a row cannot be built."""
        return self.results.utilisation

    @property
    def passes(self) -> npt.NDArray[np.bool_]:
        """Whether each row passes every check and nothing of it is left uncovered, shape (n,)."""
        passes: npt.NDArray[np.bool_] = self.results.verdict == PASS
        return passes

    @property
    def verdict(self) -> npt.NDArray[np.uint8]:
        """The verdict of each row as a key of `WORDS`, shape (n,)."""
        return self.results.verdict

    def word(self, row: int) -> str:
        """The verdict of a row in words."""
        return WORDS[int(self.verdict[self._row(row)])]

    def governing(self, row: int) -> tuple[str, str]:
        """Part and name of the check that governs a row; two empty texts where it has none."""
        row = self._row(row)
        if self.verdict[row] == CANNOT or not self.results.checks:
            return ("", "")
        return self.results.checks[int(self.results.governing[row])]

    def why(self, row: int) -> str:
        """Why a row cannot be built, or ""."""
        if self.verdict[self._row(row)] != CANNOT:
            return ""
        try:
            self.brief(row).design()
        except TensionlibError as error:
            return str(error)
        raise AssertionError(f"row {row} was left out of the study and can be designed alone")

    def pick(self, row: int) -> dict[str, Any]:
        """The value of each varied field in a row, as it was stated."""
        pick = _pick(self._row(row), self.shape)
        return {
            name: value
            for number, axis in enumerate(self.fields.axes)
            for name, value in zip(axis.names, axis.stated[pick[number]], strict=True)
        }

    def brief(self, row: int) -> Brief:
        """The brief of a row. Raises what its fields refuse."""
        return self.fields.brief(_pick(self._row(row), self.shape))

    def __getitem__(self, row: int) -> Calculation:
        """A row as a full calculation. Raises as `design` for a row that cannot be built."""
        return self.brief(row).design()

    def __iter__(self) -> Iterator[Calculation]:
        return (self[row] for row in range(len(self)))

    # Choosing -----------------------------------------------------------------------------

    def frame(
        self,
        rows: Sequence[int] | npt.NDArray[np.int64] | None = None,
        *,
        by: Sequence[By] = DEFAULT,
    ) -> Any:
        """Rows as a pandas data frame, indexed by their numbers; units stand in the heads.

        Parameters
        ----------
        rows : sequence of int, optional
            All rows unless given.
        by : sequence
            Objectives to show: names of `OBJECTIVES`, or Rates.
        """
        from tensionlib.whatif.frame import frame

        return frame(self, rows, by)

    def best_rows(self, by: By = "mass", n: int = 10) -> npt.NDArray[np.int64]:
        """Numbers of the passing rows with the least of an objective, of equals the least used."""
        rows = np.flatnonzero(self.passes)
        values = self.measure(by)[rows]
        if len(rows) > n:
            # No more than those level with the n-th need sorting.
            edge = np.partition(values, n - 1)[n - 1]
            keep = values <= edge
            rows, values = rows[keep], values[keep]
        order = np.lexsort((rows, self.utilisation[rows], values))
        return rows[order[:n]]

    def best(self, by: By = "mass", n: int = 10) -> Any:
        """The best passing rows by an objective, as `frame` shows them."""
        shown = (by, *(one for one in DEFAULT if one != by))
        return self.frame(self.best_rows(by, n), by=shown)

    def front_rows(self, first: By = "mass", second: By = "bolts") -> npt.NDArray[np.int64]:
        """The trade-off front: passing rows that no other betters in one objective without being
        worse in the other, in order of the first. "utilisation" is an objective here too."""
        rows = np.flatnonzero(self.passes)
        one, two = (self._by(by)[rows] for by in (first, second))
        order = np.lexsort((rows, self.utilisation[rows], two, one))
        least = np.minimum.accumulate(two[order])
        better = np.r_[True, two[order][1:] < least[:-1]] if len(order) else np.zeros(0, bool)
        return rows[order[better]]

    def _by(self, by: By) -> npt.NDArray[np.float64]:
        return self.utilisation if by == "utilisation" else self.measure(by)

    def write_parquet(self, path: str | PathLike[str], *, by: Sequence[By] = DEFAULT) -> Path:
        """Write every row as a Parquet file, which appears whole or not at all; gives its path."""
        from tensionlib.whatif.frame import write_parquet

        return write_parquet(self, path, by)

    def reading(self, n: int = 8) -> Reading:
        """The study in words, and its best rows by mass."""
        lists = ", ".join(f"{axis.label} ({len(axis)})" for axis in self.fields.axes)
        says = [self._counted() + ".", f"Varied: {lists or 'nothing'}."]
        says += [f"{name} is {rule.words}." for name, rule in self.fields.stated_rules.items()]
        return Reading(f"Alternatives of {self.base.member.mark}", says, self._best_table(n))

    def _best_table(self, n: int) -> list[Rows]:
        from tensionlib.whatif.frame import columns

        rows = self.best_rows(n=n)
        if not len(rows):
            return []
        varied = [column for column in columns(self) if len(column.values) > 1]
        mass, bolts = self.measure("mass"), self.measure("bolts")
        body = [
            (
                str(row),
                *(_cell(c.values[int(c.places(np.array([row]))[0])]) for c in varied),
                format_number(float(mass[row]), SUMMARY_FIGURES),
                f"{bolts[row]:.0f}",
                format_utilisation(float(self.utilisation[row])),
                ", ".join(self.governing(int(row))),
            )
            for row in rows
        ]
        head = ("row", *(c.head for c in varied), "mass [kg]", "bolts", "utilisation", "governs")
        numbers = [0, *(k for k, c in enumerate(varied, 1) if c.numeric)]
        numbers += range(len(varied) + 1, len(varied) + 4)
        return [Rows(head, body, numbers, "The lightest that pass")]

    def _repr_mimebundle_(self, include: Any = None, exclude: Any = None) -> dict[str, Any]:
        return self.reading().bundle()

    def _row(self, row: int) -> int:
        n = len(self)
        if not -n <= row < n:
            raise IndexError(f"row: got {row}; 0 to {n - 1} are in the study")
        return int(row) % n

    def _counted(self) -> str:
        counts = np.bincount(self.verdict, minlength=4)
        said = [f"{counts[PASS]:,} pass", f"{counts[FAIL]:,} fail"]
        said += [f"{counts[NOT_COVERED]:,} not covered"] if counts[NOT_COVERED] else []
        said += [f"{counts[CANNOT]:,} cannot be built"] if counts[CANNOT] else []
        return f"{len(self):,} alternatives, " + ", ".join(said)


def _cell(value: Any) -> str:
    return "none" if value is None else f"{value:g}" if isinstance(value, float) else str(value)


def _one_number(
    fields: Fields, term: Term, end: str, kind: str, times: float
) -> Callable[[dict[int, int]], tuple[dict[str, float], Any]]:
    def make(pick: dict[int, int]) -> tuple[dict[str, float], Any]:
        try:
            given = fields.given(term.reads, pick, end, kind=kind)
            if end and not kind:
                given = cast(Any, given)
                given.end = laid_out(given.end, given.section)
            return {"term": term.make(given) * times}, ()
        except InputError:
            # A row that cannot be built has no quantities.
            return {"term": np.nan}, ()

    return make


def _whole(given: Any) -> Any:
    given.end = laid_out(given.end, given.section)
    return whole_end(given)


_WHOLE_END = Piece(_whole, ("section", "steel", "overstrength", "standard", "service", "end"))


def _alone(brief: Brief) -> tuple[dict[str, float], Any]:
    """Numbers and steering of a whole brief, as a single design has them."""
    served = None
    if brief.service is not None:
        served = Number(door("service", brief.service, FORCE_ROLE).internal, "given")
    case = case_of(brief.member, find_standard(brief.standard), served)
    numbers = {key: n.value for key, n in case.numbers().items() if key != FORCE_KEY}
    return numbers, (case.member.steering, tuple(end.steering for end in case.ends))


def _pick(row: int, shape: tuple[int, ...]) -> dict[int, int]:
    return {k: int(place) for k, place in enumerate(np.unravel_index(row, shape))} if shape else {}


def merge(
    out: Results, part: Results, shape: tuple[int, ...], places: Mapping[int, Sequence[int]]
) -> None:
    """Put the results of a part, which has some values of some lists, into those of the whole."""
    at = np.ix_(*(places.get(k, range(size)) for k, size in enumerate(shape)))
    checks = np.array([out.number_of(check) for check in part.checks] or [0], np.uint16)
    first = len(out.sheets)
    where = (
        np.ravel_multi_index(np.broadcast_arrays(*at), shape).ravel() if shape else np.zeros(1, int)
    )
    out.sheets += [int(where[row]) for row in part.sheets]
    for name, values in (
        ("utilisation", part.utilisation),
        ("governing", checks[part.governing]),
        ("sheet", part.sheet + np.uint16(first)),
        ("verdict", part.verdict),
    ):
        getattr(out, name)[where] = values


def study(
    asked: Brief | Calculation | Member,
    vary: Mapping[Any, Any] | None = None,
    *,
    force: Quantity | str | None = None,
    executor: Executor | None = None,
    progress: bool | None = None,
    **more: Any,
) -> Study:
    """Work out every alternative of a brief.

    Parameters
    ----------
    asked : Brief, Calculation or Member
        What stays the same; a Member needs `force`.
    vary : mapping
        Of a field's name to a list of values, or to a rule; a tuple of names takes a list of
        tuples, whose fields vary together. Names are those of `Brief`.
    force : force
        The design force of a Member.
    executor : concurrent.futures.Executor, optional
        Works out parts of the study: a process pool, or the executor of a cluster.
    progress : bool, optional
        A progress bar; shown for `LONG` rows and more unless told otherwise.
    more
        Further lists, by names that are Python words: ``per_line=[2, 3, 4]``.

    Returns
    -------
    Study

    Raises
    ------
    DataNotFoundError, InputError, UnitError
        For an unknown name, an empty list, a value that a field refuses.
    """
    made = Study(Brief.of(asked, force), {**(vary or {}), **more})
    bar = None
    if len(made) >= LONG if progress is None else progress:
        bar = need("tqdm").tqdm(total=len(made), unit=" rows", unit_scale=True)
    told = (lambda rows: None) if bar is None else bar.update
    try:
        if executor is None:
            made.keep(made.work_out(told))
        else:
            from tensionlib.whatif.parallel import work_out

            made.keep(work_out(made, executor, told))
    finally:
        if bar is not None:
            bar.close()
    return made
