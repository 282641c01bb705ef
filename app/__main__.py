"""The command line: ``python -m app serve | hold | check``."""

from __future__ import annotations

import argparse
import json
import os
import sys
from pathlib import Path
from typing import Any

from app.answers import hold_time
from app.answers.checks import failed_checks
from app.answers.wording import answer_text
from app.errors import AppError, DefinitionRefused
from app.settings import read_settings
from app.stores import read_definition, sample_cases


def main(arguments: list[str] | None = None) -> int:
    """Run one command; returns the exit status."""
    parser = argparse.ArgumentParser(prog="python -m app", description="How long cold stores hold without power.")
    commands = parser.add_subparsers(dest="command", required=True)
    serve = commands.add_parser("serve", help="serve the app in the browser and its API")
    serve.add_argument("--host", default="127.0.0.1", help="address to listen on (default 127.0.0.1)")
    serve.add_argument("--port", type=int, default=8000, help="port to listen on (default 8000)")
    hold = commands.add_parser("hold", help="answer for a definition file, without a server")
    hold.add_argument("file", help="a store definition, or a sample case")
    hold.add_argument("--json", action="store_true", help="print the API's document")
    commands.add_parser("check", help="self test: the tables, and the checks of the sample cases")
    given = parser.parse_args(arguments)
    if given.command == "serve":
        return _serve(given.host, given.port)
    if given.command == "hold":
        return _hold(given.file, given.json)
    return _check()


def _serve(host: str, port: int) -> int:
    import uvicorn

    from app.main import create_app

    app = create_app(read_settings(os.environ))
    print(f"Stillcold is at http://{host}:{port}", flush=True)
    uvicorn.run(app, host=host, port=port, log_level="warning", timeout_graceful_shutdown=3)
    return 0


def _hold(file: str, as_json: bool) -> int:
    try:
        document = json.loads(Path(file).read_text(encoding="utf-8"))
    except (OSError, ValueError) as fault:
        print(f"{file} cannot be read: {fault}", file=sys.stderr)
        return 2
    try:
        answer = hold_time(read_definition(_store_in(document)))
    except DefinitionRefused as refused:
        for fault_ in refused.faults:
            print(f"{fault_.field}: {fault_.message} Allowed: {fault_.allowed or 'see the contract'}.", file=sys.stderr)
        return 2
    except AppError as refused:
        print(refused, file=sys.stderr)
        return 1
    print(json.dumps(answer.as_document(), indent=2, ensure_ascii=False) if as_json else answer_text(answer))
    return 0


def _store_in(document: Any) -> Any:
    """The definition in a document: the document itself, or the store of a sample case."""
    if isinstance(document, dict) and "store" in document and "enclosure" not in document:
        return document["store"]
    return document


def _check() -> int:
    failed = 0
    for case in sample_cases():
        answer = hold_time(read_definition(case.store))
        faults = failed_checks(answer.as_document(), case.checks)
        failed += len(faults)
        print(f"{'ok    ' if not faults else 'FAILED'} {case.title}")
        for fault in faults:
            print(f"       {fault}")
    print(f"{len(sample_cases())} sample cases, {failed} failed checks")
    return 1 if failed else 0


if __name__ == "__main__":
    sys.exit(main())
