"""Models to validators, straight from their fields.

Every field is read by one `Rule`, a model, or rows of models; building the validator from just these, without
pydantic's own schema generator and its search for plugins, saves a cold check a tenth of its time.
"""

from __future__ import annotations

from collections.abc import Iterable
from functools import cache
from types import NoneType, UnionType
from typing import Annotated, Any, TypeVar, Union, get_args, get_origin

from pydantic_core import SchemaValidator, core_schema

from model.rig.rule import Rule, Strict

M = TypeVar("M", bound=Strict)


def read(kind: type[M], raw: Any) -> M:
    """A model from raw values.

    Raises:
        pydantic.ValidationError: with every mistake the validator finds.
    """
    made: M = _validator(kind).validate_python(raw)
    return made


@cache
def _validator(kind: type[Strict]) -> SchemaValidator:
    return SchemaValidator(_model(kind))


def _model(kind: type[Strict]) -> core_schema.CoreSchema:
    fields = {}
    for name, field in kind.model_fields.items():
        schema = _field(field.annotation, field.metadata)
        if not field.is_required():
            default = field.get_default(call_default_factory=True, validated_data={})
            schema = core_schema.with_default_schema(schema, default=default)
        fields[name] = core_schema.model_field(schema)
    config = core_schema.CoreConfig(strict=True, extra_fields_behavior="forbid")
    inner = core_schema.model_fields_schema(fields, model_name=kind.__name__)
    return core_schema.model_schema(kind, inner, config=config)


def _field(annotation: Any, metadata: Iterable[Any] = ()) -> core_schema.CoreSchema:
    rule = next((one for one in metadata if isinstance(one, Rule)), None)
    if rule is not None:
        return core_schema.no_info_plain_validator_function(rule)
    if isinstance(annotation, type) and issubclass(annotation, Strict):
        return _model(annotation)
    origin, inner = get_origin(annotation), get_args(annotation)
    if origin is Annotated:
        return _field(inner[0], inner[1:])
    if origin in (Union, UnionType) and len(inner) == 2 and inner[1] is NoneType:
        return core_schema.nullable_schema(_field(inner[0]))
    if origin is tuple and inner[1:] == (...,):
        # Not strict: a strict tuple refuses the lists of TOML.
        return core_schema.tuple_schema([_field(inner[0])], variadic_item_index=0, strict=False)
    if origin is dict and inner[0] is str:
        return core_schema.dict_schema(core_schema.str_schema(), _field(inner[1]))
    raise TypeError(f"no rule reads {annotation!r}")
