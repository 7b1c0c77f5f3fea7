"""A real browser without a window: Debian's Chromium, driven over the pipe of its protocol."""

from __future__ import annotations

import base64
import json
import os
import select
import shutil
import subprocess
import sys
import time
from collections.abc import Sequence
from pathlib import Path
from types import TracebackType
from typing import Any

CHROMIUM = shutil.which("chromium")

_PATIENCE = 60.0

_WITH_PIPES = """
import fcntl, os, sys
ends = [fcntl.fcntl(int(number), fcntl.F_DUPFD, 10) for number in sys.argv[1:3]]
for end, number in zip(ends, (3, 4)):
    os.dup2(end, number)
os.execv(sys.argv[3], sys.argv[3:])
"""
"""Chromium reads commands from file descriptor 3 and answers on 4."""


class DrivenBrowser:
    """One browser with one page; commands and events are JSON texts that end with a null byte."""

    def __init__(self, folder: Path) -> None:
        to_child, self._out = os.pipe()
        self._in, from_child = os.pipe()
        arguments = [
            str(CHROMIUM),
            "--headless",
            "--no-sandbox",
            "--disable-gpu",
            "--no-first-run",
            "--disable-background-networking",
            "--disable-component-update",
            "--disable-sync",
            "--remote-debugging-pipe",
            f"--user-data-dir={folder}",
            "about:blank",
        ]
        self._process = subprocess.Popen(
            [sys.executable, "-c", _WITH_PIPES, str(to_child), str(from_child), *arguments],
            pass_fds=(to_child, from_child),
            stdout=subprocess.DEVNULL,
            stderr=subprocess.DEVNULL,
        )
        os.close(to_child)
        os.close(from_child)
        self._rest = b""
        self._number = 0
        self._session: str | None = None
        self.events: list[dict[str, Any]] = []
        targets = self.call("Target.getTargets")["targetInfos"]
        target = next(each["targetId"] for each in targets if each["type"] == "page")
        attached = self.call("Target.attachToTarget", targetId=target, flatten=True)
        self._session = attached["sessionId"]
        for domain in ("Page", "Runtime", "Log", "Network"):
            self.call(f"{domain}.enable")

    def __enter__(self) -> DrivenBrowser:
        return self

    def __exit__(
        self,
        kind: type[BaseException] | None,
        error: BaseException | None,
        trace: TracebackType | None,
    ) -> None:
        self.close()

    def close(self) -> None:
        """End the browser that was started here, and no other."""
        self._process.terminate()
        try:
            self._process.wait(20)
        except subprocess.TimeoutExpired:
            self._process.kill()
            self._process.wait()
        os.close(self._out)
        os.close(self._in)

    def call(self, method: str, **parameters: Any) -> dict[str, Any]:
        """The result of a command; events that come before it are kept."""
        self._number += 1
        number = self._number
        message: dict[str, Any] = {"id": number, "method": method, "params": parameters}
        if self._session:
            message["sessionId"] = self._session
        content = json.dumps(message).encode() + b"\0"
        while content:
            content = content[os.write(self._out, content) :]
        end = time.monotonic() + _PATIENCE
        while True:
            answer = self._read(end)
            if answer.get("id") != number:
                self.events.append(answer)
            elif "error" in answer:
                raise RuntimeError(f"{method}: {answer['error']}")
            else:
                result: dict[str, Any] = answer["result"]
                return result

    def _read(self, end: float) -> dict[str, Any]:
        while b"\0" not in self._rest:
            ready, _, _ = select.select([self._in], [], [], max(0.0, end - time.monotonic()))
            if not ready:
                raise TimeoutError("the browser does not answer")
            received = os.read(self._in, 1 << 16)
            if not received:
                raise RuntimeError("the browser has ended")
            self._rest += received
        text, self._rest = self._rest.split(b"\0", 1)
        message: dict[str, Any] = json.loads(text)
        return message

    def wait_for(self, method: str, seconds: float = _PATIENCE) -> dict[str, Any]:
        """The parameters of the next event of this name, which is taken out of those kept."""
        end = time.monotonic() + seconds
        while True:
            for place, event in enumerate(self.events):
                if event.get("method") == method:
                    parameters: dict[str, Any] = self.events.pop(place)["params"]
                    return parameters
            self.events.append(self._read(end))

    def open(self, page: Path, width: int = 1280, height: int = 800) -> None:
        """Show a file in a window of this size, and wait until it has loaded."""
        self.resize(width, height)
        for seconds in (20.0, _PATIENCE):  # on a busy machine a browser now and then loses one
            self.events.clear()
            self.call("Page.navigate", url=page.as_uri())
            try:
                self.wait_for("Page.loadEventFired", seconds)
            except TimeoutError:
                continue
            return
        raise TimeoutError(f"the browser does not load {page.name}")

    def resize(self, width: int, height: int) -> None:
        """Give the page so many pixels."""
        self.call(
            "Emulation.setDeviceMetricsOverride",
            width=width,
            height=height,
            deviceScaleFactor=1,
            mobile=False,
        )

    def run(self, script: str) -> Any:
        """The value of an expression in the page; a promise is awaited."""
        result = self.call(
            "Runtime.evaluate", expression=script, awaitPromise=True, returnByValue=True
        )
        if "exceptionDetails" in result:
            raise RuntimeError(json.dumps(result["exceptionDetails"])[:1000])
        return result["result"].get("value")

    def press(self, key: str, kinds: Sequence[str] = ("keyDown", "keyUp")) -> None:
        """Press and release a key, as a person does; with "keyDown" alone it is held down."""
        code = {" ": "Space"}.get(key, key)
        number = {
            "ArrowLeft": 37, "ArrowRight": 39, "Home": 36, "End": 35, " ": 32, "Tab": 9,
        }.get(key, ord(key[0].upper()))  # fmt: skip
        text = key if len(key) == 1 else ""
        for kind in kinds:
            self.call(
                "Input.dispatchKeyEvent",
                type=kind,
                key=key,
                code=code,
                windowsVirtualKeyCode=number,
                **({"text": text} if text and kind == "keyDown" else {}),
            )

    def metrics(self) -> dict[str, float]:
        """What the page has cost so far, by name, as the browser counts it; times in seconds."""
        found = self.call("Performance.getMetrics")["metrics"]
        return {each["name"]: each["value"] for each in found}

    def mistakes(self) -> list[str]:
        """What went wrong since the page was opened: exceptions, and what its policy stopped."""
        self.run("1")
        found = []
        for event in self.events:
            entry = event["params"].get("entry", {})
            if event["method"] == "Runtime.exceptionThrown":
                details = event["params"]["exceptionDetails"]
                found.append(details.get("exception", details).get("description", str(details)))
            elif entry.get("level") == "error":
                found.append(entry["text"])
        return found

    def requests(self) -> list[str]:
        """The addresses that the page has asked for since it was opened."""
        self.run("1")
        sent = (each for each in self.events if each["method"] == "Network.requestWillBeSent")
        return [each["params"]["request"]["url"] for each in sent]

    def picture(self, file: Path, is_whole: bool = False) -> None:
        """Write what is seen as PNG."""
        data = self.call("Page.captureScreenshot", format="png", captureBeyondViewport=is_whole)
        file.write_bytes(base64.b64decode(data["data"]))
