"""Writes test/data/strd from the files of the NIST Statistical Reference Datasets (public domain).

    python3 test/tools/strd-fixtures.py FOLDER

FOLDER holds linear/*.dat and nonlinear/*.dat as NIST distributes them. Numbers are kept as NIST prints them.
"""

import json
import re
import sys
from pathlib import Path

SOURCE = "NIST Statistical Reference Datasets"
OUT = Path(__file__).resolve().parents[1] / "data" / "strd"
NUMBER = r"[-+]?(?:\d+\.?\d*|\.\d+)(?:[EeDd][-+]?\d+)?"


def numbers(line):
    return [float(n) for n in re.findall(NUMBER, line)]


def level(text):
    return re.search(r"(Lower|Average|Higher) Level of Difficulty", text).group(1).lower()


def data_rows(lines):
    starts = [i for i, line in enumerate(lines) if line.startswith("Data:")]
    rows = []
    for line in lines[starts[-1] + 1 :]:
        if line.strip():
            row = [float(word) for word in line.split()]
            rows.append(row)
    return rows


def after(text, pattern):
    return float(re.search(pattern + r"\s*(" + NUMBER + ")", text).group(1))


def nonlinear(path):
    text = path.read_text()
    lines = text.splitlines()
    parameters = [numbers(line.split("=", 1)[1]) for line in lines if re.match(r"\s*b\d+\s*=\s*" + NUMBER + r"\s+" + NUMBER, line)]
    rows = data_rows(lines)
    return {
        "name": path.stem,
        "source": SOURCE,
        "level": level(text),
        "starts": [[p[0] for p in parameters], [p[1] for p in parameters]],
        "values": [p[2] for p in parameters],
        "deviations": [p[3] for p in parameters],
        "residualSumOfSquares": after(text, r"Residual Sum of Squares:"),
        "residualDeviation": after(text, r"Residual Standard Deviation:"),
        "predictors": [list(column) for column in zip(*[row[1:] for row in rows])],
        "observed": [row[0] for row in rows],
    }


def linear(path):
    text = path.read_text()
    lines = text.splitlines()
    certified = [re.match(r"\s+B(\d+)\s+(" + NUMBER + r")\s+(" + NUMBER + r")\s*$", line) for line in lines]
    certified = [m for m in certified if m]
    rows = data_rows(lines)
    predictors = [list(column) for column in zip(*[row[1:] for row in rows])]
    first = int(certified[0].group(1))
    return {
        "name": path.stem,
        "source": SOURCE,
        "level": level(text),
        "model": "multilinear" if len(predictors) > 1 else "polynomial",
        "lowestPower": first,
        "values": [float(m.group(2)) for m in certified],
        "deviations": [float(m.group(3)) for m in certified],
        "residualDeviation": after(text, r"Residual\s+Standard Deviation"),
        "rSquared": after(text, r"R-Squared"),
        "predictors": predictors,
        "observed": [row[0] for row in rows],
    }


def write(kind, convert, folder):
    out = OUT / kind
    out.mkdir(parents=True, exist_ok=True)
    for path in sorted((folder / kind).glob("*.dat")):
        fixture = convert(path)
        body = ",\n".join(f"  {json.dumps(key)}: {json.dumps(value)}" for key, value in fixture.items())
        (out / f"{path.stem.lower()}.json").write_text("{\n" + body + "\n}\n")
        print(path.stem, len(fixture["observed"]), len(fixture["values"]), len(fixture["predictors"]), fixture["level"])


write("nonlinear", nonlinear, Path(sys.argv[1]))
write("linear", linear, Path(sys.argv[1]))
