"""The kinds of value that tables of a design file hold, as types of pydantic.

Only the modules of tables import this one, since it loads pydantic.
"""

from __future__ import annotations

import datetime
import math
from collections.abc import Callable
from dataclasses import dataclass
from typing import Annotated, Any, ClassVar, Self

from pydantic import (
    AfterValidator,
    BaseModel,
    BeforeValidator,
    ConfigDict,
    GetCoreSchemaHandler,
    GetJsonSchemaHandler,
    ValidationInfo,
    model_validator,
)
from pydantic.json_schema import JsonSchemaValue
from pydantic_core import CoreSchema, core_schema

from tensionlib.errors import InputError, TensionlibError, UnitError, did_you_mean
from tensionlib.package.files.fields import (
    FORCE_EXAMPLE,
    named,
    take_force,
    text_block,
    text_line,
)
from tensionlib.package.files.problems import reason_of, shown
from tensionlib.quantities import LENGTH, Quantity, count, door, factor
from tensionlib.quantities.roles import Role


@dataclass(frozen=True, eq=False)
class Taken:
    """A field taken by a function of its name and value, with its own JSON Schema."""

    take: Callable[[str, Any], object]
    json: dict[str, Any]

    def _read(self, value: Any, info: ValidationInfo) -> object:
        name = str(info.field_name)
        try:
            return self.take(name, value)
        except (UnitError, InputError) as error:
            raise InputError(reason_of(error, name)) from None

    def __get_pydantic_core_schema__(
        self, source: object, handler: GetCoreSchemaHandler
    ) -> CoreSchema:
        return core_schema.with_info_plain_validator_function(self._read)

    def __get_pydantic_json_schema__(
        self, schema: CoreSchema, handler: GetJsonSchemaHandler
    ) -> JsonSchemaValue:
        return dict(self.json)


def one_of(*accepted: str) -> Taken:
    """Text that is one of a few words."""

    def take(name: str, value: Any) -> str:
        if not isinstance(value, str) or value not in accepted:
            raise InputError(
                f"got {shown(value)}; one of {', '.join(map(repr, accepted))} is due."
                + (did_you_mean(value, accepted) if isinstance(value, str) else "")
            )
        return value

    return Taken(take, {"type": "string", "enum": list(accepted)})


def measured(
    role: Role, example: str, *, above: float | None = None, at_least: float | None = None
) -> Taken:
    """A quantity of a role as text with its unit; limits in N, mm, MPa and rad."""

    def take(name: str, value: Any) -> Quantity:
        return door(name, value, role, above=above, at_least=at_least, example=repr(example))

    limit = "" if at_least is None else ", zero or more"
    json = {
        "type": "string",
        "description": f"{role.phrase} with its unit{limit}",
        "examples": [example],
    }
    return Taken(take, json)


def above_zero(example: str) -> Taken:
    """A length above zero as text with its unit."""
    return measured(LENGTH, example, above=0.0)


def zero_or_more(example: str) -> Taken:
    """A length of zero or more as text with its unit."""
    return measured(LENGTH, example, at_least=0.0)


def whole(at_least: int = 1, at_most: int | None = None) -> Taken:
    """A whole number."""
    json = {"type": "integer", "minimum": at_least} | ({"maximum": at_most} if at_most else {})
    return Taken(lambda name, value: count(name, value, at_least, at_most), json)


def plain_number(
    *, above: float | None = None, at_least: float | None = None, at_most: float | None = None
) -> Taken:
    """A plain number without a unit."""
    limits = {"exclusiveMinimum": above, "minimum": at_least, "maximum": at_most}
    return Taken(
        lambda name, value: factor(name, value, above=above, at_least=at_least, at_most=at_most),
        {"type": "number"} | {key: limit for key, limit in limits.items() if limit is not None},
    )


def _name(name: str, value: Any) -> str:
    if not isinstance(value, str):
        raise InputError(f"got {shown(value)}; text in quotation marks is due")
    return named(value)


def _option(name: str, value: Any) -> str | int | float | bool:
    if isinstance(value, str):
        return text_line(value)
    if isinstance(value, int | float) and math.isfinite(value):
        return value
    raise InputError(f"got {shown(value)}; text, a finite number, true or false is due")


def _date(value: object) -> object:
    """A date of TOML as text; text stays."""
    if isinstance(value, datetime.date) and not isinstance(value, datetime.datetime):
        return value.isoformat()
    return value


def _pair(name: str, value: Any) -> tuple[Quantity, Quantity]:
    if not isinstance(value, list) or len(value) != 2:
        raise InputError(f'got {shown(value)}; two lengths are due, for example ["0 mm", "120 mm"]')
    first, second = (door(name, one, LENGTH, example="120 mm") for one in value)
    return first, second


_FORCE_JSON = {"type": "string", "examples": [FORCE_EXAMPLE]}

Block = Annotated[str, AfterValidator(text_block)]
Line = Annotated[str, AfterValidator(text_line)]
Name = Annotated[str, Taken(_name, {"type": "string", "minLength": 1, "pattern": "\\S"})]
Date = Annotated[str, BeforeValidator(_date), AfterValidator(text_line)]
Pair = Annotated[
    tuple[Quantity, Quantity],
    Taken(
        _pair,
        {
            "type": "array",
            "description": "two lengths with their units",
            "items": {"type": "string"},
            "minItems": 2,
            "maxItems": 2,
            "examples": [["0 mm", "120 mm"]],
        },
    ),
]
Tension = Taken(
    take_force,
    _FORCE_JSON | {"description": "design tension force with its unit, zero or more"},
)
OtherForce = Taken(take_force, _FORCE_JSON | {"description": "a force with its unit, zero or more"})
StatedFactor = Annotated[float | None, plain_number(above=0.0, at_most=1.0)]
Option = Annotated[
    str | int | float | bool, Taken(_option, {"type": ["string", "number", "boolean"]})
]


class Table(BaseModel):
    """A table of the file: its keys are known, and nothing is turned from one kind to another."""

    model_config = ConfigDict(extra="forbid", strict=True, frozen=True)

    def stated(self, *, but: tuple[str, ...] = ()) -> dict[str, Any]:
        """The fields that the file states, in the order of the model; tables in it as dicts."""
        keys = (key for key in type(self).model_fields if key in self.model_fields_set)
        return {key: _plain(getattr(self, key)) for key in keys if key not in but}


def _plain(value: Any) -> Any:
    if isinstance(value, Table):
        return value.stated()
    if isinstance(value, list):
        return [_plain(one) for one in value]
    return value


class TogetherError(InputError):
    """Fields of a table that do not go together; the message begins with the field it lies in."""


class Part(Table):
    """A table that stands for an object of its own, which is made to check the table whole."""

    makes: ClassVar[Callable[..., object]]

    @model_validator(mode="after")
    def _made(self) -> Self:
        try:
            type(self).makes(**self.stated())
        except TensionlibError as error:
            raise TogetherError(str(error)) from None
        return self
