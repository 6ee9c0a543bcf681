#!/usr/bin/python3
"""Runs every command line that README.md and docs/*.md show in their code blocks.

A block is a series of lines; those that begin with `steelyard ` are run by the shell in a folder that
holds the data sets as datasets/, with the names studies.csv and result.json that the examples use.
Each must end with status 0 (or with the status that the line says: `# exit status 4`). A block marked
```text directly behind holds lines that must stand in what the last command printed.

usage: tour.py STEELYARD SOURCE
"""
import glob
import os
import re
import shutil
import subprocess
import sys
import tempfile

steelyard, source = sys.argv[1:3]
FENCE = re.compile(r"^```(\w*)\n(.*?)^```$", re.M | re.S)
EXAMPLES = "study,year,n1,n2,t,role,setting\n" + "".join(
    f"{name},{year},{n},{n},{t},{role},{place}\n" for name, year, n, t, role, place in [
        ("Miller 1998", 1998, 20, 2.41, "original", "lab"),
        ("Moss 2003", 2003, 30, 1.52, "replication", "field"),
        ("Reed 2009", 2009, 45, 2.02, "replication", "lab"),
        ("Vale 2015", 2015, 60, 0.87, "replication", "field")])

failed = 0
ran = 0
with tempfile.TemporaryDirectory() as folder:
    os.mkdir(f"{folder}/bin")
    os.symlink(steelyard, f"{folder}/bin/steelyard")
    shutil.copytree(f"{source}/datasets", f"{folder}/datasets")
    with open(f"{folder}/studies.csv", "w", encoding="utf-8") as file:
        file.write(EXAMPLES)
    environment = {"PATH": f"{folder}/bin:/usr/bin:/bin", "LANG": "C.UTF-8"}

    def run(line):
        return subprocess.run(["/bin/sh", "-c", line], cwd=folder, env=environment, capture_output=True, check=False)

    run("steelyard pool studies.csv --json result.json")
    pages = [f"{source}/README.md", f"{source}/datasets/README.md"] + sorted(glob.glob(f"{source}/docs/*.md"))
    for page in pages:
        with open(page, encoding="utf-8") as file:
            text = file.read()
        printed = ""
        for language, block in FENCE.findall(text):
            if language == "text":
                for line in filter(str.strip, block.splitlines()):
                    if line.strip() != "..." and line.rstrip() not in printed:
                        print(f"FAILED {page}: not printed: {line}")
                        failed += 1
                continue
            for line in block.splitlines():
                if not line.startswith("steelyard ") or "COMMAND" in line:
                    continue
                expected = re.search(r"# exit status (\d)", line)
                done = run(line)
                printed = done.stdout.decode()
                ran += 1
                if done.returncode != (int(expected.group(1)) if expected else 0):
                    print(f"FAILED {page}: {line}\n  status {done.returncode}\n  {done.stderr.decode()}")
                    failed += 1

print(f"{ran} command lines of README and docs ran, {failed} failed")
sys.exit(failed != 0 or ran < 20)
