"""Answer the brief LIDS with a DuckDB query: `python -m tests.bench.duck DIR [--threads N] [--load]`.

Prints, as JSON, how many pairs fit and the ids of the best hundred. The query reads only the columns that it needs;
with --load both files are read whole into tables first, so that every cell is held against its column's type.
"""

import argparse
import json
from pathlib import Path

import duckdb

ASK = {
    "W": 120.0,
    "H": 90.0,
    "above": 2.5,
    "below": 2.5,
    "z": 1.5,
    "sampling": 0.1,
    "blur": 0.1,
    "lambda": 550e-6,
    "feature": 0.4,
    "near": 250.0,
    "far": 450.0,
    "comfort": 0.2,
    "top": 100,
}
"""The numbers of the brief, mm; above, below and z counted from the focus plane midway between 4 above and 1 below."""

_FILE = "read_csv('{}', header = true, delim = ',', quote = '\"', escape = '\"')"
"""The dialect stated, which saves DuckDB from guessing it."""


def main() -> None:
    """Print the answer."""
    parser = argparse.ArgumentParser()
    parser.add_argument("folder", type=Path)
    parser.add_argument("--threads", type=int)
    parser.add_argument("--load", action="store_true")
    args = parser.parse_args()
    market = duckdb.connect(config={"threads": args.threads} if args.threads else {})
    for name in ("cameras", "lenses"):
        file = _FILE.format(str(args.folder / f"{name}.csv").replace("'", "''"))
        market.execute(f"CREATE {'TEMP TABLE' if args.load else 'TEMP VIEW'} {name} AS SELECT * FROM {file}")
    rows = market.execute(Path(__file__).with_suffix(".sql").read_text("utf-8"), ASK).fetchall()
    print(json.dumps({"fitting": rows[0][2] if rows else 0, "rigs": [row[:2] for row in rows]}))


if __name__ == "__main__":
    main()
