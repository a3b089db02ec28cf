"""Hands out what scripts measured, as tests/Shared/Figures.cs does: one line "key, tab, value" each, to the file named by PERMITSCREEN_FIGURES."""

import os


def note(key, value):
    """Prints a figure and keeps it."""
    text = f"{value:.6g}" if isinstance(value, float) else str(value)
    print(f"figure - {key}: {text}", flush=True)
    path = os.environ.get("PERMITSCREEN_FIGURES")
    if path:
        with open(path, "a", encoding="utf-8") as out:
            out.write(f"{key}\t{text}\n")
