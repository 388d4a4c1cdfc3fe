"""The command: ``catspaw serve`` and ``catspaw check``; ``python -m service`` is the same."""

import argparse
import os
import sys

from service.config import ConfigurationError, read, service_version


def _parser() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(prog="catspaw", description="Air-water gas exchange over HTTP.")
    parser.add_argument("--version", action="version", version=f"catspaw {service_version()}")
    commands = parser.add_subparsers(dest="command")
    serve = commands.add_parser("serve", help="start the service (the default)")
    serve.add_argument("--bind", metavar="HOST:PORT", help="address to listen on (default 127.0.0.1:8660)")
    serve.add_argument("--workers", metavar="N", help="worker processes (default 2)")
    serve.add_argument("--check", action="store_true", help="print the settings in force, and start nothing")
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
    asked = {"CATSPAW_BIND": options.bind, "CATSPAW_WORKERS": options.workers}
    try:
        config = read(os.environ | {name: value for name, value in asked.items() if value is not None})
    except ConfigurationError as error:
        print(f"catspaw: {error}", file=sys.stderr)
        return 2
    from service.serve import serve, warnings

    for line in warnings(config):
        print(f"catspaw: {line}", file=sys.stderr)
    if options.check:
        print("\n".join(f"{name}={value}" for name, value in config.told().items()))
        return 0
    return serve(config)


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


if __name__ == "__main__":
    sys.exit(main())
