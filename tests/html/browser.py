"""A headless Chromium that opens a file, prints it, and says what it asked for and complained of."""

import base64
import contextlib
import json
import os
import shutil
import subprocess
import time
import urllib.request
from collections.abc import Iterator
from pathlib import Path

import pytest
import websocket

NAMES = ("chromium", "chromium-browser")
FLAGS = (
    "--headless",
    "--no-sandbox",
    "--disable-gpu",
    "--disable-quic",
    "--no-first-run",
    "--disable-background-networking",
    "--disable-component-update",
    "--disable-sync",
    "--hide-scrollbars",
    "--remote-debugging-port=0",
)
SECONDS = 60.0
#: Width and height in inches.
A4, LETTER = (8.27, 11.69), (8.5, 11.0)


def program() -> str:
    """Return the browser; only where nobody counts on the test may it be left out."""
    found = next((path for path in map(shutil.which, NAMES) if path), None)
    if found is None and os.environ.get("CI"):
        pytest.fail("there is no Chromium: apt-get install chromium")
    if found is None:
        pytest.skip("there is no Chromium to look at pages with: apt-get install chromium")
    return found


class Browser:
    """One tab, driven over the DevTools protocol."""

    def __init__(self, port: int) -> None:
        self._count = 0
        self.asked: list[str] = []
        self.troubles: list[str] = []
        [target] = [one for one in _tabs(port) if one["type"] == "page"][:1]
        self._socket = websocket.create_connection(
            target["webSocketDebuggerUrl"], timeout=SECONDS, suppress_origin=True
        )
        for domain in ("Page", "Runtime", "Network", "Log"):
            self.do(f"{domain}.enable")

    def close(self) -> None:
        """End the browser."""
        self.do("Browser.close")
        self._socket.close()

    def do(self, method: str, **parameters: object) -> dict:
        """Send a command and return its answer; events on the way are kept."""
        self._count += 1
        self._socket.send(json.dumps({"id": self._count, "method": method, "params": parameters}))
        while True:
            message = json.loads(self._socket.recv())
            if message.get("id") == self._count:
                assert "error" not in message, message
                return message["result"]
            self._note(message)

    def _note(self, event: dict) -> None:
        method, more = event.get("method"), event.get("params", {})
        if method == "Network.requestWillBeSent":
            self.asked.append(more["request"]["url"])
        elif method in ("Runtime.consoleAPICalled", "Runtime.exceptionThrown", "Log.entryAdded"):
            self.troubles.append(json.dumps(more))

    def open(self, path: Path, width: int = 1200, height: int = 900) -> None:
        """Open a file and wait until it has loaded."""
        self.asked, self.troubles = [], []
        phone = width < 600
        self.do(
            "Emulation.setDeviceMetricsOverride",
            width=width, height=height, deviceScaleFactor=1, mobile=phone,
        )  # fmt: skip
        self.do("Page.navigate", url=path.as_uri())
        until = time.monotonic() + SECONDS
        while self.ask("location.href + document.readyState") != path.as_uri() + "complete":
            assert time.monotonic() < until, f"{path} did not load"

    def ask(self, script: str) -> object:
        """Return the value of an expression in the page."""
        answer = self.do("Runtime.evaluate", expression=script, returnByValue=True)
        assert "exceptionDetails" not in answer, answer
        return answer["result"].get("value")

    def pdf(self, size: tuple[float, float]) -> bytes:
        """Return the page as it is printed on paper of a size."""
        answer = self.do("Page.printToPDF", paperWidth=size[0], paperHeight=size[1], printBackground=True)
        return base64.b64decode(answer["data"])

    def picture(self) -> bytes:
        """Return the whole page as a PNG."""
        answer = self.do("Page.captureScreenshot", captureBeyondViewport=True)
        return base64.b64decode(answer["data"])


def _tabs(port: int) -> list[dict]:
    with urllib.request.urlopen(f"http://127.0.0.1:{port}/json/list", timeout=SECONDS) as answer:
        return json.load(answer)


@contextlib.contextmanager
def browser(folder: Path) -> Iterator[Browser]:
    """Start a browser with a profile of its own, and end it."""
    command = [program(), *FLAGS, f"--user-data-dir={folder}", "about:blank"]
    quiet = {"stdout": subprocess.DEVNULL, "stderr": subprocess.DEVNULL}
    with subprocess.Popen(command, **quiet) as process:
        try:
            found = Browser(_port(folder, process))
            yield found
            found.close()
            process.wait(SECONDS)
        finally:
            process.kill()


def _port(folder: Path, process: subprocess.Popen) -> int:
    written = folder / "DevToolsActivePort"
    until = time.monotonic() + SECONDS
    while not (written.exists() and written.read_text(encoding="ascii").strip()):
        assert process.poll() is None, "the browser ended before it could be asked"
        assert time.monotonic() < until, "the browser did not start"
        time.sleep(0.05)
    return int(written.read_text(encoding="ascii").split()[0])
