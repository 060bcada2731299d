"""The fields of a study's alternatives: which list sets each, and what it holds in a row.

A field is set by a list of its own, by a list of whole objects it lies in ("end"), by a rule that
follows other fields, or stays as the brief has it.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from copy import copy
from dataclasses import dataclass
from types import SimpleNamespace
from typing import Any, cast

from tensionlib.errors import InputError
from tensionlib.joints.ends import Bolted, Welded
from tensionlib.members.brief import Brief, changed
from tensionlib.members.pieces import Given
from tensionlib.whatif.doors import through_door

Pick = Mapping[int, int]
"""Of each list by its number, the place of the value picked."""


@dataclass(frozen=True)
class Rule:
    """A field that follows others: `by` of the values of the fields in `reads`, in that order."""

    reads: tuple[str, ...]
    by: Callable[..., Any]
    words: str

    def __post_init__(self) -> None:
        if not callable(self.by):
            raise InputError(f"by: got {self.by!r}; a function of {', '.join(self.reads)} is due")


@dataclass(frozen=True)
class Axis:
    """One list of a study: the fields it sets, and for each value what each field is set to."""

    names: tuple[str, ...]
    options: tuple[tuple[Any, ...], ...]
    stated: tuple[tuple[Any, ...], ...]
    """The values as they were given, which make a brief."""

    def part(self, places: Sequence[int]) -> Axis:
        """The same list with some of its values."""
        options, stated = self.options, self.stated
        return Axis(
            self.names,
            tuple(options[place] for place in places),
            tuple(stated[place] for place in places),
        )

    def __len__(self) -> int:
        return len(self.options)

    @property
    def label(self) -> str:
        return ", ".join(self.names)


class Fields:
    """Every field of a study by its full name.

    Parameters
    ----------
    base : Brief
        Holds what no list and no rule sets.
    vary : mapping
        Of a name, or a tuple of names, to a list of values (of tuples), or of a name to a `Rule`.

    Raises
    ------
    InputError, UnitError, DataNotFoundError
        For an unknown name, one set twice, an empty list, or a value its field refuses.
    """

    def __init__(self, base: Brief, vary: Mapping[Any, Any]) -> None:
        self.base = base
        self.rules: dict[str, Rule] = {}
        self.stated_rules: dict[str, Rule] = {}
        axes: list[Axis] = []
        for key, values in vary.items():
            names = tuple(base.full_name(n) for n in (key if isinstance(key, tuple) else (key,)))
            if isinstance(values, Rule):
                reads = tuple(_beside(base, names[0], read) for read in values.reads)
                self.rules[names[0]] = Rule(reads, values.by, values.words)
                self.stated_rules[names[0]] = values
                continue
            axes.append(_axis(base, key, names, values))
        self.axes = tuple(axes)
        self._own: dict[str, int] = {}
        for number, axis in enumerate(axes):
            for name in axis.names:
                if name in self._own or name in self.rules:
                    raise InputError(f"{name}: set twice; give each field one list or one rule")
                self._own[name] = number
        self._axes: dict[str, set[int]] = {}
        self._implied()

    def _implied(self) -> None:
        """Rules that follow from what the ends are."""
        for name in ("end", "far_end"):
            end = getattr(self.base.member, name)
            lengths = f"{name}.length_1", f"{name}.length_2"
            if (
                isinstance(end, Welded)
                and lengths[0] in self._own
                and not self._set(lengths[1])
                and end.length_1 == end.length_2
            ):
                self.rules[lengths[1]] = Rule((lengths[0],), lambda length: length, "as length_1")
        self._single = {
            f"{name}.{field}": f"{name}.lines"
            for name in ("end", "far_end")
            for field in ("line_spacing", "stagger")
            if f"{name}.lines" in self._own and isinstance(getattr(self.base.member, name), Bolted)
        }
        """What one line of bolts has no use for, and the field that says so."""

    def _set(self, name: str) -> bool:
        return name in self._own or name in self.rules

    def own(self, name: str) -> int | None:
        """Number of the list that sets a field itself, or None."""
        return self._own.get(name)

    def touches(self, name: str) -> bool:
        """Whether any list or rule has a say in what a field holds."""
        return bool(self._find(name)) or name in self.rules

    def part(self, places: Mapping[int, Sequence[int]]) -> Fields:
        """The same fields with some of the values of some lists."""
        other = copy(self)
        other.axes = tuple(
            axis.part(places[number]) if number in places else axis
            for number, axis in enumerate(self.axes)
        )
        return other

    # Which lists a field depends on -------------------------------------------------------

    def axes_of(self, names: Sequence[str]) -> tuple[int, ...]:
        """Numbers of the lists on which some fields depend, in order."""
        found: set[int] = set()
        for name in names:
            found |= self._axes[name] if name in self._axes else self._find(name)
        return tuple(sorted(found))

    def _find(self, name: str) -> set[int]:
        found: set[int] = set()
        if name in self._single:
            found |= self._find(self._single[name])
        if name in self.rules:
            for read in self.rules[name].reads:
                found |= self._find(read)
        else:
            found |= {n for own, n in self._own.items() if _touches(own, name)}
            for below, rule in self.rules.items():
                if below.startswith(name + "."):
                    for read in rule.reads:
                        found |= self._find(read)
        self._axes[name] = found
        return found

    def read_of(self, name: str) -> tuple[str, ...]:
        """The fields whose lists decide a field, itself with them unless a rule sets it."""
        out = list(self._single.get(name, "").split() or ())
        if name in self.rules:
            for read in self.rules[name].reads:
                out += self.read_of(read)
            return tuple(out)
        for below, rule in self.rules.items():
            if below.startswith(name + "."):
                for read in rule.reads:
                    out += self.read_of(read)
        return (name, *out)

    def classes(self, number: int, names: Sequence[str]) -> tuple[list[int], list[int]]:
        """The values of a list as far as some fields can tell them apart.

        Returns
        -------
        of : list of int
            The class of each value of the list.
        first : list of int
            The place of the first value of each class.
        """
        axis = self.axes[number]
        decisive = {full for name in names for full in self.read_of(name)}
        seen: dict[Any, int] = {}
        of: list[int] = []
        first: list[int] = []
        for place, option in enumerate(axis.options):
            told: list[Any] = []
            for own, value in zip(axis.names, option, strict=True):
                for name in sorted(decisive):
                    if name == own or own.startswith(name + "."):
                        told.append(_told(value))
                    elif name.startswith(own + "."):
                        told.append(_told(_below(value, name[len(own) + 1 :])))
            key = tuple(told)
            if key not in seen:
                seen[key] = len(first)
                first.append(place)
            of.append(seen[key])
        return of, first

    # What a field holds -------------------------------------------------------------------

    def value(self, name: str, pick: Pick) -> Any:
        """What a field holds where these values are picked; the lists it depends on are."""
        if name in self._single and self.value(self._single[name], pick) == 1:
            return None
        if name in self.rules:
            rule = self.rules[name]
            ruled = rule.by(*(self.value(read, pick) for read in rule.reads))
            return through_door(self.base, name, ruled)
        if name in self._own:
            found = self._option(name, pick)
        else:
            above = name.rpartition(".")[0]
            while above and above not in self._own:
                above = above.rpartition(".")[0]
            if above:
                found = _below(self._option(above, pick), name[len(above) + 1 :])
            else:
                found = through_door(self.base, name, self.base.value(name))
        below = {
            own[len(name) + 1 :]: self.value(own, pick)
            for own in (*self._own, *self.rules, *self._single)
            if own.startswith(name + ".")
        }
        return changed(found, below) if below else found

    def _option(self, name: str, pick: Pick) -> Any:
        number = self._own[name]
        axis = self.axes[number]
        return axis.options[pick[number]][axis.names.index(name)]

    def given(self, reads: Sequence[str], pick: Pick, end: str, **same: str) -> Given:
        """Only these fields, as pieces read them.

        Parameters
        ----------
        end : str
            Name of the end at hand, "" for the member.
        same : str
            What holds for all rows: label and prefix, and the kind of the end.
        """
        kind = same.pop("kind", "")
        flat: dict[str, Any] = dict(same)
        of_end: dict[str, Any] = {}
        of_plate: dict[str, Any] = {}
        for name in reads:
            if name == "end":
                flat["end"] = self.value(end, pick)
            elif name.startswith("end.plate."):
                of_plate[name[10:]] = self.value(f"{end}{name[3:]}", pick)
            elif name.startswith("end."):
                of_end[name[4:]] = self.value(f"{end}{name[3:]}", pick)
            else:
                flat[name] = self.value(name, pick)
        if end and "end" not in flat:
            flat["end"] = SimpleNamespace(kind=kind, plate=SimpleNamespace(**of_plate), **of_end)
        return cast(Given, SimpleNamespace(**flat))

    def brief(self, pick: Pick) -> Brief:
        """The brief of the alternative these values make. Raises what its fields refuse."""
        changes: dict[str, Any] = {
            name: value
            for number, place in pick.items()
            for name, value in zip(
                self.axes[number].names, self.axes[number].stated[place], strict=True
            )
        }
        for name in (*self.rules, *self._single):
            changes[name] = self.value(name, pick)
        return self.base.but(changes)


def _beside(base: Brief, name: str, read: str) -> str:
    """The field a rule for `name` reads: one of the same end before any other."""
    of_end = f"{name.partition('.')[0]}.{read}"
    return of_end if of_end in base.names() else base.full_name(read)


def _touches(own: str, name: str) -> bool:
    """Whether a list that sets `own` has a say in what `name` holds."""
    return own == name or own.startswith(name + ".") or name.startswith(own + ".")


def _below(holder: Any, name: str) -> Any:
    for part in name.split("."):
        holder = None if holder is None else getattr(holder, part)
    return holder


def _told(value: Any) -> Any:
    """What tells a value from others; the object itself where it has no hash."""
    try:
        hash(value)
    except TypeError:
        return id(value)
    return (type(value).__name__, value)


def _axis(base: Brief, key: Any, names: tuple[str, ...], values: Any) -> Axis:
    if isinstance(values, str) or not hasattr(values, "__iter__"):
        raise InputError(f"{key}: got {values!r}; a list of values, or a rule, is due")
    stated = tuple(tuple(v) if isinstance(key, tuple) else (v,) for v in values)
    if not stated:
        raise InputError(f"{key}: an empty list; give at least one value")
    for row in stated:
        if len(row) != len(names):
            raise InputError(f"{key}: got {row!r}; {len(names)} values together are due")
    options = tuple(
        tuple(through_door(base, name, value) for name, value in zip(names, row, strict=True))
        for row in stated
    )
    return Axis(names, options, stated)
