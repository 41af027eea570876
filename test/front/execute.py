"""Executes a notebook headless, again and again, each time with a fresh kernel.

usage: execute.py NOTEBOOK RUNS OUT.ipynb

Compares every run with the committed notebook: an output counts as lost where a cell has fewer
outputs that show something than it has there. Prints one line of JSON; the last run is written to
OUT.ipynb. The front end is nbclient, the one behind `jupyter nbconvert --execute`.
"""

import json
import logging
import os
import re
import sys
import time

import nbformat
from nbclient import NotebookClient


# What a line of progress says in the end; only runs longer than a moment have one.
PROGRESS = re.compile(r"^[a-z ]+: (done|stopped|failed) after ")


def shown(cell):
    """Outputs that show something: a display hook that has displayed by itself returns nothing."""
    return [o for o in cell.get("outputs", [])
            if o["output_type"] in ("stream", "error") or
            (o.get("data") and not PROGRESS.match(o["data"].get("text/plain", "")))]


class Warnings(logging.Handler):
    """Keeps what nbclient warns of, such as outputs it did not wait for."""

    def __init__(self):
        super().__init__(logging.WARNING)
        self.texts = []

    def emit(self, record):
        self.texts.append(record.getMessage())


def main(path, runs, out):
    warnings = Warnings()
    log = logging.getLogger("front")
    log.addHandler(warnings)
    committed = nbformat.read(path, as_version=4)
    folder = os.path.dirname(os.path.abspath(path))
    lost = errors = stderr = 0
    details = []
    began = time.time()
    for run in range(runs):
        notebook = nbformat.read(path, as_version=4)
        for cell in notebook.cells:
            if cell.cell_type == "code":
                cell.outputs, cell.execution_count = [], None
        # The front end's own patience (4 s by default) is not what is tested: a busy machine can
        # hold the whole process up for longer than that.
        client = NotebookClient(notebook, timeout=300, iopub_timeout=60, kernel_name="evenface",
                                allow_errors=True, log=log,
                                resources={"metadata": {"path": folder}})
        client.execute()
        details.extend(f"run {run}: {text}" for text in warnings.texts)
        warnings.texts.clear()
        for number, (before, after) in enumerate(zip(committed.cells, notebook.cells)):
            if before.cell_type != "code":
                continue
            missing = len(shown(before)) - len(shown(after))
            if missing > 0:
                lost += missing
                details.append(f"run {run}, cell {number}: {missing} outputs lost")
            for output in shown(after):
                if output["output_type"] == "error":
                    errors += 1
                    details.append(f"run {run}, cell {number}: {output['ename']} {output['evalue']}")
                elif output.get("name") == "stderr":
                    stderr += 1
                    details.append(f"run {run}, cell {number}: stderr {output['text'][:200]}")
    for cell in notebook.cells:
        cell.metadata.pop("execution", None)  # times of day
        if cell.cell_type == "code":
            cell.outputs = shown(cell)
    notebook.metadata.language_info = committed.metadata.language_info
    nbformat.write(notebook, out)
    expected = sum(len(shown(c)) for c in committed.cells if c.cell_type == "code")
    print(json.dumps({"runs": runs, "outputs": expected * runs, "lost": lost, "errors": errors,
                      "stderr": stderr, "seconds": round(time.time() - began, 1),
                      "details": details[:20]}))


if __name__ == "__main__":
    main(sys.argv[1], int(sys.argv[2]), sys.argv[3])
