"""A trade study: builds a family of wings with spanwise and reads the table. Standard library only.

    python3 examples/family.py examples/dunlin.toml target/study

Which of these wings has the most room inside for its wetted area, with a span of at most 2.6 m? The program `spanwise` is
looked for on the path, or where the environment variable SPANWISE says.
"""

import csv
import json
import os
import pathlib
import subprocess
import sys

SPAN = 2600.0  # mm


def build(spec, folder):
    """Writes a table of variants and has them built."""
    folder.mkdir(parents=True, exist_ok=True)
    table = folder / "variants.csv"
    with table.open("w", newline="", encoding="utf-8") as file:
        rows = csv.writer(file)
        rows.writerow(["name", "planform.aspect_ratio", "planform.taper_ratio", "airfoil.root"])
        for aspect in range(6, 13, 2):
            for taper in (30, 45, 60):
                for section in ("2412", "2415"):
                    rows.writerow([f"ar{aspect}-t{taper}-{section}", aspect, f"{taper} %", f"NACA {section}"])
    command = [os.environ.get("SPANWISE", "spanwise"), "family", spec, "--table", table, "-o", folder / "wings"]
    done = subprocess.run(command + ["--only", "step,stl", "--resume", "--quiet"])
    # 1: some wing was not built, or is out of tolerance; the table says which
    if done.returncode not in (0, 1):
        sys.exit(done.returncode)
    return folder / "wings"


def main():
    if len(sys.argv) != 3:
        sys.exit("usage: family.py SPEC FOLDER")
    wings = build(sys.argv[1], pathlib.Path(sys.argv[2]))

    with (wings / "family.csv").open(newline="", encoding="utf-8") as file:
        rows = list(csv.DictReader(file))
    for row in rows:
        if row["status"] != "ok":
            print(f"{row['name']}: {row['status']} {row['error']}")
    fit = [row for row in rows if row["status"] == "ok" and float(row["reference.span"]) <= SPAN]
    fit.sort(key=lambda row: float(row["built.volume"]) / float(row["built.wetted_area"]), reverse=True)
    print(f"{len(rows)} wings, {len(fit)} with a span of at most {SPAN:g} mm")
    print(f"{'name':<14}{'span mm':>10}{'volume/area mm':>16}")
    for row in fit[:3]:
        share = float(row["built.volume"]) / float(row["built.wetted_area"])
        print(f"{row['name']:<14}{float(row['reference.span']):>10.1f}{share:>16.3f}")

    # everything that is known of the best: a line of family.jsonl
    with (wings / "family.jsonl").open(encoding="utf-8") as file:
        best = next(line for line in map(json.loads, file) if line["name"] == fit[0]["name"])
    print(f"centroid of the best: {[round(c, 1) for c in best['figures']['built']['centroid']]}")
    print(f"its solid: {wings / best['figures']['files']['step']}")


if __name__ == "__main__":
    main()
