#!/usr/bin/python3
"""Holds every document that the command writes against its schema.

usage: schemas.py STEELYARD DOCS DATASETS
"""
import glob
import json
import subprocess
import sys

import jsonschema

steelyard, docs, datasets = sys.argv[1:4]


def schema(name):
    with open(f"{docs}/schema/{name}.schema.json", encoding="utf-8") as file:
        loaded = json.load(file)
    jsonschema.Draft202012Validator.check_schema(loaded)
    return jsonschema.Draft202012Validator(loaded)


OWN_UNITS = ["--effect-prior", "normal(0, 15)", "--spread-prior", "half-normal(10)"]
RUNS = [(["pool", path] + (OWN_UNITS if "eight-schools" in path else []))
        for path in sorted(glob.glob(f"{datasets}/*.csv")) if "replication" not in path]
RUNS += [["pool", f"{datasets}/demo.csv", "--region", "-0.1:0.1", "--threshold", "0.2"],
         ["pool", f"{datasets}/demo.csv", "--without", "Alder 1994", "--direction", "greater"],
         ["check", f"{datasets}/demo.csv"],
         ["weigh", f"{datasets}/demo.csv"],
         ["weigh", "--t", "2.1", "--n1", "30", "--n2", "32", "--region", "-0.1:0.1"],
         ["stress", f"{datasets}/demo.csv"],
         ["stress", f"{datasets}/heterogeneous.csv", "--by", "setting"],
         ["replicate", f"{datasets}/replication.csv"]]

failed = 0
for run in RUNS:
    done = subprocess.run([steelyard, *run, "--json", "-"], capture_output=True, check=False)
    if done.returncode != 0:
        print("FAILED", run, done.stderr.decode())
        failed += 1
        continue
    document = json.loads(done.stdout, parse_constant=lambda word: sys.exit(f"{run} writes {word}"))
    errors = list(schema(run[0]).iter_errors(document))
    for error in errors[:5]:
        print("FAILED", run, list(error.absolute_path), error.message[:300])
    failed += bool(errors)

studies = schema("studies")
studies.validate([{"study": "A", "t": 2.1, "n1": 20, "n2": "20"}])
studies.validate({"studies": [{"p": "<.05", "label of my own": None}]})
for wrong in ({"study": "A"}, [1], "text"):
    if studies.is_valid(wrong):
        print("FAILED: the schema of input accepts", wrong)
        failed += 1

print(f"{len(RUNS)} documents held against their schemas, {failed} failed")
sys.exit(failed != 0)
