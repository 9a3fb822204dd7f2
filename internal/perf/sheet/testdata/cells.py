"""Writes cells.json: what Python's own csv module reads in the sheets of this folder.

Run from this folder: python3 cells.py. The Go test reads the same sheets and must find
the same cells. Encoding and delimiter are told to Python and found by the program."""

import csv
import io
import json

SHEETS = {
    "power_semicolon_utf8bom.csv": ("utf-8-sig", ";", ","),
    "propeller_comma.csv": ("utf-8", ",", "."),
    "polar_tab_utf16.csv": ("utf-16", "\t", ","),
    "consumption_latin1.csv": ("latin-1", ";", ","),
    "long_rows.csv": ("utf-8", ",", "."),
}


def cells(name, encoding, delimiter):
    with open(name, encoding=encoding, newline="") as f:
        rows = csv.reader(io.StringIO(f.read(), newline=""), delimiter=delimiter, strict=True)
        return [[c.strip().replace("\r\n", "\n") for c in row] for row in rows if any(row) and not row[0].startswith("#")]


out = {n: {"delimiter": d, "decimal": s, "cells": cells(n, e, d)} for n, (e, d, s) in SHEETS.items()}
with open("cells.json", "w", encoding="utf-8") as f:
    json.dump(out, f, ensure_ascii=False, indent=1)
    f.write("\n")
