"""A real browser without a window: Debian's Chromium, where it is installed."""

import json
import re
import shutil
import subprocess
from html import unescape
from pathlib import Path
from typing import Any

import pytest

CHROMIUM = shutil.which("chromium")

needs_chromium = pytest.mark.skipif(
    CHROMIUM is None, reason="there is no chromium here to look with"
)


def measure_in_browser(page: str, script: str, folder: Path, width: int) -> Any:
    """The value of a script about ``inner``, the document of a page that is so many pixels wide.

    The page, HTML or SVG, lies in a frame, since a window is never narrower than 500 pixels.
    """
    file = folder / ("page.svg" if page.startswith("<svg") else "page.html")
    file.write_text(page, encoding="utf-8")
    host = folder / "host.html"
    host.write_text(_HOST % (file.name, width, script), encoding="utf-8")
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
    finished = subprocess.run(arguments, capture_output=True, text=True, check=True, timeout=120)
    found = re.search(r'<pre id="report">(.*?)</pre>', finished.stdout, re.DOTALL)
    assert found, finished.stdout[-500:]
    return json.loads(unescape(found[1]))


_HOST = """<!doctype html>
<iframe src="%s" width="%d" height="800" style="border:0"></iframe>
<pre id="report"></pre>
<script>
const measure = (inner) => {%s}
window.onload = () => {
  const inner = document.querySelector("iframe").contentDocument;
  document.getElementById("report").textContent = JSON.stringify(measure(inner));
}
</script>
"""
