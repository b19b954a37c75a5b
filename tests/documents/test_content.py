from __future__ import annotations

import json

import pytest
from jsonschema import Draft202012Validator
from pydantic import ValidationError

from gaugelog.documents.content import RECORD_FORMAT, RecordContent
from gaugelog.documents.schema import model_schema, shipped_schema
from tests.documents.sample import sample


def test_the_shipped_schema_is_that_of_the_models() -> None:
    assert model_schema() == shipped_schema()


def test_the_schema_is_itself_valid() -> None:
    Draft202012Validator.check_schema(shipped_schema())


def test_a_record_fits_its_schema() -> None:
    data = json.loads(sample().model_dump_json())
    assert [] == list(Draft202012Validator(shipped_schema()).iter_errors(data))


def test_the_schema_refuses_a_bare_number_for_a_value() -> None:
    data = json.loads(sample().model_dump_json())
    data["readings"][0]["value"] = 350.4
    assert not Draft202012Validator(shipped_schema()).is_valid(data)


def test_a_record_comes_back_from_its_json_unchanged() -> None:
    content = sample()
    assert content == RecordContent.model_validate_json(content.model_dump_json())


def test_a_record_names_its_format() -> None:
    assert RECORD_FORMAT == sample().format


def test_an_unknown_field_is_refused() -> None:
    with pytest.raises(ValidationError, match="colour"):
        sample(colour="blue")


def test_a_record_cannot_be_changed() -> None:
    with pytest.raises(ValidationError, match="frozen"):
        sample().revision = 2


def test_no_float_stands_in_the_data() -> None:
    def floats(value: object) -> int:
        if isinstance(value, dict):
            return sum(floats(each) for each in value.values())
        if isinstance(value, list):
            return sum(floats(each) for each in value)
        return int(isinstance(value, float))

    assert 0 == floats(json.loads(sample().model_dump_json()))
