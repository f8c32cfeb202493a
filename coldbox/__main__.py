"""`coldbox` and `python -m coldbox`."""

from coldbox.cli.main import main

if __name__ == "__main__":
    raise SystemExit(main())
