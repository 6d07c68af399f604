"""Reads the demo's files with Python's own csv, zipfile and ElementTree, knowing each dialect beforehand, and writes what a reader must find.

    python3 tests/reference/intake/read-demo-files.py > tests/reference/intake/demo-files.json
"""

import csv
import io
import json
import math
import pathlib
import zipfile
from xml.etree import ElementTree

FILES = pathlib.Path(__file__).resolve().parents[3] / "db/demo/files"
SPECIES = ["H2", "Ar", "N2", "CO", "CH4", "CO2"]
ROOM = {"temperature": 273.15, "pressure": 101325.0}
GAS = 8.31446261815324


def molar(ml_per_min, pressure_pa):
    return ml_per_min * 1e-6 / 60 * pressure_pa / (GAS * 273.15)


def german(text):
    return float(text.replace(",", "."))


def logs(name):
    raw = (FILES / name).read_bytes()
    if raw[:2] in (b"\xff\xfe", b"\xfe\xff"):
        rows = list(csv.reader(io.StringIO(raw.decode("utf-16")), delimiter="\t"))[1:]
        return [(float(r[2]), float(r[4]) * 1e3 + 101325, molar(float(r[6]), 101325), r[10] == "bypass") for r in rows if r]
    if raw[:3] == b"\xef\xbb\xbf":
        text = [line for line in raw.decode("utf-8-sig").splitlines() if not line.startswith("#")]
        rows = list(csv.reader(text))[1:]
        psi = 6894.757293168
        return [(float(r[2]) + 273.15, float(r[4]) * psi + 101325, molar(float(r[6]), 101325), r[10] == "Bypass") for r in rows if r]
    rows = list(csv.reader(io.StringIO(raw.decode("cp1252")), delimiter=";"))
    start = next(i for i, r in enumerate(rows) if r and r[0] == "Datum") + 2
    return [(german(r[3]) + 273.15, german(r[5]) * 1e5, molar(german(r[7]), 101300), r[11] == "BYPASS") for r in rows[start:] if r]


def long_table(rows, number, species, area):
    injections = {}
    for row in rows:
        injections.setdefault(row[number], {})[row[species]] = area(row)
    return list(injections.values())


def analyser(name):
    if name.endswith(".xlsx"):
        space = {"m": "http://schemas.openxmlformats.org/spreadsheetml/2006/main"}
        with zipfile.ZipFile(FILES / name) as book:
            sheet = ElementTree.fromstring(book.read("xl/worksheets/sheet2.xml"))
        table = []
        for row in sheet.iterfind(".//m:row", space):
            cells = {}
            for cell in row.iterfind("m:c", space):
                text = cell.findtext("m:v", None, space) or cell.findtext("m:is/m:t", None, space)
                cells[cell.get("r").rstrip("0123456789")] = text
            table.append(cells)
        def area(cells):
            try:
                return float(cells.get("E"))
            except (TypeError, ValueError):
                return None
        return long_table([c for c in table[1:] if c.get("C")], "A", "C", area)
    text = (FILES / name).read_text("utf-8-sig")
    if ";" in text.splitlines()[0]:
        rows = list(csv.reader(io.StringIO(text), delimiter=";"))[1:]
        return long_table([r for r in rows if r], 0, 2, lambda r: None if r[4].startswith("<") else german(r[4]))
    rows = list(csv.DictReader(io.StringIO(text)))
    return [{s: float(r[f"{s} area"]) if r[f"{s} area"] else None for s in SPECIES} for r in rows]


result = {}
for path in sorted(FILES.iterdir()):
    if "-rig" in path.name:
        rows = logs(path.name)
        result[path.name] = {
            "rows": len(rows),
            "bypassRows": sum(r[3] for r in rows),
            "firstBedK": rows[0][0],
            "lastBedK": rows[-1][0],
            "sumBedK": math.fsum(r[0] for r in rows),
            "sumInletPa": math.fsum(r[1] for r in rows),
            "sumFlowCO2MolPerS": math.fsum(r[2] for r in rows),
        }
    elif "-analysis" in path.name:
        found = analyser(path.name)
        result[path.name] = {
            "injections": len(found),
            "sumArea": {s: math.fsum(i.get(s) or 0.0 for i in found) for s in SPECIES},
            "seen": {s: sum(i.get(s) is not None for i in found) for s in SPECIES},
        }
print(json.dumps(result, indent=1))
