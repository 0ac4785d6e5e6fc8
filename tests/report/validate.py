#!/usr/bin/env python3
"""Holds JSON reports against the schema: validate.py SCHEMA REPORT...

The published schema lets unknown keys pass, since new ones may be added. Here it is closed first, so that a key which the
schema does not know is an error too. Exit status 0 when every report is valid.
"""
import json
import sys

import jsonschema


def closed(schema):
    if isinstance(schema, list):
        return [closed(item) for item in schema]
    if not isinstance(schema, dict):
        return schema
    result = {key: closed(value) for key, value in schema.items()}
    # A dict of type "object" with keys of its own; the `if` of an input names only some keys and must stay open.
    if result.get("type") == "object" and isinstance(result.get("properties"), dict):
        result.setdefault("additionalProperties", False)
    return result


def refuse(word):
    raise ValueError(f"{word} is no JSON number")


def unique(pairs):
    keys = [key for key, _ in pairs]
    twice = {key for key in keys if keys.count(key) > 1}
    if twice:
        raise ValueError(f"keys occur twice: {sorted(twice)}")
    return dict(pairs)


def errors_of(validator, path):
    try:
        with open(path, encoding="utf-8", errors="strict") as file:
            report = json.load(file, parse_constant=refuse, object_pairs_hook=unique)
    except (OSError, ValueError) as error:
        return [str(error)]
    return [f"{error.json_path}: {error.message[:300]}" for error in validator.iter_errors(report)]


def main(schema_path, *reports):
    with open(schema_path, encoding="utf-8") as file:
        schema = json.load(file)
    jsonschema.Draft202012Validator.check_schema(schema)
    validator = jsonschema.Draft202012Validator(closed(schema))
    failed = False
    for path in reports:
        for error in errors_of(validator, path):
            print(f"{path}: {error}")
            failed = True
    return 1 if failed or not reports else 0


if __name__ == "__main__":
    if len(sys.argv) < 3:
        sys.exit(__doc__)
    sys.exit(main(*sys.argv[1:]))
