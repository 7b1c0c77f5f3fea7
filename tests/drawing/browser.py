"""A real browser without a window: Debian's Chromium, where it is installed."""

import json
import re
import shutil
import subprocess
from collections.abc import Sequence
from html import unescape
from pathlib import Path
from typing import Any

import pytest

CHROMIUM = shutil.which("chromium")

needs_chromium = pytest.mark.skipif(
    CHROMIUM is None, reason="there is no chromium here to look with"
)


def measure_in_browser(views: Sequence[tuple[str, int]], script: str, folder: Path) -> list[Any]:
    """The value of a script about ``inner``, the document of each page at a width in pixels.

    Every page, HTML or SVG, lies in a frame of its own, since a window is never narrower than 500
    pixels; all are looked at by one browser, which takes a while to start.
    """
    frames = []
    for number, (page, width) in enumerate(views):
        file = folder / f"{number}.{'svg' if page.startswith('<svg') else 'html'}"
        file.write_text(page, encoding="utf-8")
        frames.append(f'<iframe src="{file.name}" width="{width}" height="800" style="border:0">')
    host = folder / "host.html"
    host.write_text(_HOST % ("</iframe>".join([*frames, ""]), script), encoding="utf-8")
    arguments = [
        str(CHROMIUM),
        "--headless",
        "--no-sandbox",
        "--disable-gpu",
        "--no-first-run",
        "--disable-background-networking",
        "--disable-component-update",
        "--disable-sync",
        "--hide-scrollbars",
        "--allow-file-access-from-files",
        f"--user-data-dir={folder / 'profile'}",
        "--window-size=1400,900",
        "--dump-dom",
        host.as_uri(),
    ]
    finished = subprocess.run(arguments, capture_output=True, text=True, check=True, timeout=180)
    found = re.search(r'<pre id="report">(.*?)</pre>', finished.stdout, re.DOTALL)
    assert found, finished.stdout[-500:]
    measured: list[Any] = json.loads(unescape(found[1]))
    return measured


_HOST = """<!doctype html>
%s
<pre id="report"></pre>
<script>
const measure = (inner) => {%s}
window.onload = () => {
  const frames = [...document.querySelectorAll("iframe")];
  const found = frames.map((frame) => measure(frame.contentDocument));
  document.getElementById("report").textContent = JSON.stringify(found);
}
</script>
"""
