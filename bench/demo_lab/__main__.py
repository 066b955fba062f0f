"""`python -m bench.demo_lab --out DIR` writes the run files of the demonstration lab (its `runs/` folder)."""

from __future__ import annotations

import argparse
from pathlib import Path

from bench.demo_lab.run_files import run_files


def main() -> None:
    """Write every run file into the folder given by --out."""
    parser = argparse.ArgumentParser(prog="python -m bench.demo_lab", description=__doc__)
    parser.add_argument("--out", type=Path, required=True, metavar="DIR", help="folder for the run files")
    folder: Path = parser.parse_args().out
    folder.mkdir(parents=True, exist_ok=True)
    files = run_files()
    for name, content in files.items():
        (folder / name).write_bytes(content)
    print(f"{len(files)} run files in {folder}")


if __name__ == "__main__":
    main()
