"""The command: ``catspaw serve`` and ``catspaw check``; ``python -m service`` is the same."""

import argparse
import sys

from service.config import Config, ConfigurationError, read, service_version


def _parser() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(prog="catspaw", description="Air-water gas exchange over HTTP.")
    parser.add_argument("--version", action="version", version=f"catspaw {service_version()}")
    commands = parser.add_subparsers(dest="command")
    serve = commands.add_parser("serve", help="start the service (the default)")
    serve.add_argument("--bind", metavar="HOST:PORT", help="address to listen on (default 127.0.0.1:8660)")
    serve.add_argument("--workers", type=int, metavar="N", help="worker processes (default 2)")
    check = commands.add_parser("check", help="recompute every published figure, and fail where one does not come out")
    check.add_argument("--gas", metavar="GAS", help="only the checks of this gas")
    check.add_argument("--method", metavar="METHOD", help="only the checks of this method")
    return parser


def main(arguments: list[str] | None = None) -> int:
    """Run the command and return its exit status."""
    words = sys.argv[1:] if arguments is None else arguments
    if not words or (words[0].startswith("--") and words[0] not in ("--version", "--help")):
        words = ["serve", *words]
    options = _parser().parse_args(words)
    if options.command == "check":
        return _check(options)
    try:
        config = read()
    except ConfigurationError as error:
        print(f"catspaw: {error}", file=sys.stderr)
        return 2
    from service.serve import serve

    return serve(_with(config, options))


def _check(options: argparse.Namespace) -> int:
    from service.evidence import report
    from service.physics.faults import Refused

    try:
        lines, status = report(options.gas, options.method)
    except Refused as error:
        print(f"catspaw: {error}", file=sys.stderr)
        return 2
    print("\n".join(lines))
    return status


def _with(config: Config, options: argparse.Namespace) -> Config:
    from dataclasses import replace

    if options.bind:
        config = replace(config, bind=options.bind)
    if options.workers:
        config = replace(config, workers=options.workers)
    return config


if __name__ == "__main__":
    sys.exit(main())
