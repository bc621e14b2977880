"""JSON documents: unit in the key, full precision, null for what is not a result."""

from __future__ import annotations

import json
from collections.abc import Iterable, Mapping
from typing import Any

from combustor.base.finding import Finding
from combustor.report import fields
from combustor.report.field import plain, row


def dumps(document: Mapping[str, Any]) -> str:
    """Return ``document`` as JSON text; never NaN, never infinity."""
    return json.dumps(strict(document), indent=2, allow_nan=False, ensure_ascii=False)


def strict(value: Any) -> Any:
    """Return ``value`` in plain Python containers and numbers, null for what is not finite."""
    if isinstance(value, Mapping):
        return {str(key): strict(item) for key, item in value.items()}
    if isinstance(value, (list, tuple)):
        return [strict(item) for item in value]
    if hasattr(value, "tolist"):
        return strict(value.tolist())
    return plain(value)


def findings_list(found: Iterable[Finding]) -> list[dict[str, Any]]:
    """Return findings as JSON objects."""
    return [row(fields.FINDINGS, finding) for finding in found]
