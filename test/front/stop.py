"""Presses Stop during a long solve, in a real kernel.

usage: stop.py FOLDER CELLS.json

CELLS.json holds the code of four cells: set-up, the long solve, what it found, and the state from
the set-up. FOLDER is the kernel's working directory. Prints one line of JSON: how long the long
cell went on after the interrupt, and what each cell showed.
"""

import json
import sys
import threading
import time

from jupyter_client import KernelManager

WAIT = 2.0  # seconds of solving before Stop is pressed


def main(folder, path):
    with open(path, encoding="utf-8") as file:
        cells = json.load(file)
    manager = KernelManager(kernel_name="evenface")
    manager.start_kernel(cwd=folder)
    client = manager.client()
    client.start_channels()
    client.wait_for_ready(timeout=60)
    shown = []

    def run(code, press_after=None):
        texts, pressed = [], []

        def press():
            pressed.append(time.time())
            manager.interrupt_kernel()

        def hook(message):
            content = message["content"]
            if message["header"]["msg_type"] == "error":
                texts.append("error: " + content["evalue"])
            elif "data" in content and "text/plain" in content["data"]:
                texts.append(content["data"]["text/plain"])
            elif message["header"]["msg_type"] == "stream":
                texts.append(content["text"])

        if press_after is not None:
            threading.Timer(press_after, press).start()
        reply = client.execute_interactive(code, output_hook=hook, timeout=120)
        ended = time.time()
        shown.append({"status": reply["content"]["status"], "texts": texts})
        return ended - pressed[0] if pressed else None

    try:
        run(cells[0])
        latency = run(cells[1], WAIT)
        run(cells[2])
        run(cells[3])
        time.sleep(1.5)
        print(json.dumps({"latency": latency, "alive": manager.is_alive(), "cells": shown}))
    finally:
        client.stop_channels()
        manager.shutdown_kernel(now=True)


if __name__ == "__main__":
    main(sys.argv[1], sys.argv[2])
