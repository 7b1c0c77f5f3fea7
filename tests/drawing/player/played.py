"""A page of a proof under the hand of a test, which says when the next frame of the screen is."""

from __future__ import annotations

import json
from pathlib import Path
from typing import Any

from tests.drawing.browser import DrivenBrowser
from tests.drawing.svg_reader import Picture, read_picture

_CLOCK = """
window.waitingFrames = [];
window.requestAnimationFrame = (callback) => window.waitingFrames.push(callback);
window.clockOfTest = 0;
window.showNextFrame = (milliseconds) => {
  window.clockOfTest += milliseconds;
  const callbacks = window.waitingFrames.splice(0);
  callbacks.forEach((callback) => callback(window.clockOfTest));
  return callbacks.length;
};
"""

_LOOK = """
[...document.querySelectorAll("#stage svg.braid")].map((svg) =>
  [...svg.querySelectorAll("path[stroke-width='3.6']:not([display])")].map((path) =>
    [path.getAttribute("stroke"), path.getAttribute("d")]))
"""

SLIDE = """(() => {
  const slider = document.getElementById("slider");
  slider.value = %d;
  slider.dispatchEvent(new Event("input"));
})()"""

Strands = list[tuple[str, str]]
"""The colour and the path data of each component."""


class PlayedPage:
    """An open page whose frames come when ``next_frame`` is called, and at no other time."""

    def __init__(self, browser: DrivenBrowser, page: str, folder: Path) -> None:
        self.browser = browser
        file = folder / "proof.html"
        file.write_text(page, encoding="ascii")
        script = browser.call("Page.addScriptToEvaluateOnNewDocument", source=_CLOCK)
        browser.open(file)
        browser.call("Page.removeScriptToEvaluateOnNewDocument", identifier=script["identifier"])
        self.choose("sideways", False)

    def choose(self, name: str, is_chosen: bool) -> None:
        """Click a check box, unless it stands as wanted."""
        self.browser.run(
            f"(() => {{ const box = document.getElementById({json.dumps(name)});"
            f"if (box.checked !== {json.dumps(is_chosen)}) box.click(); }})()"
        )

    def select(self, name: str, value: str) -> None:
        """Choose a value of a list."""
        self.browser.run(
            f"(() => {{ const list = document.getElementById({json.dumps(name)});"
            f"list.value = {json.dumps(value)}; list.dispatchEvent(new Event('change')); }})()"
        )

    def slide(self, stop: int) -> None:
        """Move the slider."""
        self.browser.run(SLIDE % stop)

    @property
    def last_stop(self) -> int:
        return int(self.browser.run("document.getElementById('slider').max"))

    def text(self, name: str) -> str:
        """The text of an element."""
        return str(self.browser.run(f"document.getElementById({json.dumps(name)}).textContent"))

    def next_frame(self, milliseconds: float = 50.0) -> bool:
        """Show a frame so much later; whether the page wanted one."""
        return bool(self.browser.run(f"showNextFrame({milliseconds})"))

    def strands(self) -> list[Strands]:
        """What is drawn in each picture, from left to right."""
        found: list[Any] = self.browser.run(_LOOK)
        return [[(colour, data) for colour, data in picture] for picture in found]

    def picture(self, number: int = 0) -> Picture:
        """A picture as the reader of pictures sees it."""
        return picture_of(self.strands()[number])


def picture_of(strands: Strands) -> Picture:
    """The strands, read back as from a file."""
    paths = "".join(f'<path stroke="{colour}" d="{data}"/>' for colour, data in strands)
    group = f'<g fill="none" stroke-width="3.6">{paths}</g>'
    return read_picture(f'<svg xmlns="http://www.w3.org/2000/svg">{group}</svg>')
