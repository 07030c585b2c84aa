"""A headless Chromium driven over its own pipe: no package, no port, no network."""

import json
import os
import select
import shutil
import subprocess
import tempfile
import time

FLAGS = [
    "--headless",
    "--no-sandbox",
    "--disable-gpu",
    "--disable-quic",
    "--no-first-run",
    "--disable-background-networking",
    "--disable-component-update",
    "--disable-sync",
    "--disable-dev-shm-usage",
    "--hide-scrollbars",
    "--force-color-profile=srgb",
    "--remote-debugging-pipe",
]


class Trouble(Exception):
    """The browser said no, or nothing in time."""


class Browser:
    """One Chromium process with one page."""

    def __init__(self, program="chromium"):
        path = shutil.which(program)
        if path is None:
            raise Trouble(f"{program} is not installed")
        self.profile = tempfile.mkdtemp(prefix="lenzbore-browser-")
        to_browser, self.out = os.pipe()
        self.inward, from_browser = os.pipe()
        command = [path, *FLAGS, f"--user-data-dir={self.profile}", "about:blank"]

        def place():
            # Chromium reads from descriptor 3 and writes to 4; both ends are moved out of the way first.
            a, b = os.dup2(to_browser, 103), os.dup2(from_browser, 104)
            os.dup2(a, 3)
            os.dup2(b, 4)

        self.process = subprocess.Popen(
            command, preexec_fn=place, close_fds=False, stdin=subprocess.DEVNULL, stdout=subprocess.DEVNULL, stderr=subprocess.DEVNULL
        )
        os.close(to_browser)
        os.close(from_browser)
        self.buffer = b""
        self.count = 0
        self.events = []
        target = self.send("Target.createTarget", url="about:blank")["targetId"]
        self.session = self.send("Target.attachToTarget", targetId=target, flatten=True)["sessionId"]
        for domain in ("Page", "Runtime", "Log", "Network"):
            self.send(f"{domain}.enable")

    def __enter__(self):
        return self

    def __exit__(self, *_):
        self.process.terminate()
        try:
            self.process.wait(10)
        except subprocess.TimeoutExpired:
            self.process.kill()
            self.process.wait()
        os.close(self.out)
        os.close(self.inward)
        shutil.rmtree(self.profile, ignore_errors=True)

    def send(self, method, **params):
        """Calls a method of the browser and gives its result."""
        self.count += 1
        message = {"id": self.count, "method": method, "params": params}
        if getattr(self, "session", None) and not method.startswith("Target."):
            message["sessionId"] = self.session
        os.write(self.out, json.dumps(message).encode() + b"\0")
        while True:
            answer = self.receive(60)
            if answer.get("id") == self.count:
                if "error" in answer:
                    raise Trouble(f"{method}: {answer['error']}")
                return answer["result"]

    def receive(self, seconds):
        """The next message; events are kept too."""
        deadline = time.monotonic() + seconds
        while b"\0" not in self.buffer:
            left = deadline - time.monotonic()
            if left <= 0 or not select.select([self.inward], [], [], left)[0]:
                raise Trouble("the browser does not answer")
            piece = os.read(self.inward, 1 << 20)
            if not piece:
                raise Trouble("the browser has ended")
            self.buffer += piece
        raw, self.buffer = self.buffer.split(b"\0", 1)
        message = json.loads(raw)
        if "method" in message:
            self.events.append(message)
        return message

    def evaluate(self, expression):
        """The value of a JavaScript expression, promises awaited."""
        answer = self.send("Runtime.evaluate", expression=expression, awaitPromise=True, returnByValue=True)
        if "exceptionDetails" in answer:
            raise Trouble(f"{expression[:80]}: {answer['exceptionDetails'].get('exception', {}).get('description')}")
        return answer["result"].get("value")

    def wait_for(self, expression, seconds=30):
        """Waits until an expression holds."""
        deadline = time.monotonic() + seconds
        while time.monotonic() < deadline:
            if self.evaluate(expression):
                return
            time.sleep(0.05)
        raise Trouble(f"in {seconds} s never: {expression}")

    def open(self, path, width=1280, height=900):
        """Opens a file at a window size."""
        self.send("Emulation.setDeviceMetricsOverride", width=width, height=height, deviceScaleFactor=1, mobile=width < 600)
        self.send("Page.navigate", url="file://" + os.path.abspath(path))
        self.wait_for("document.readyState === 'complete' && location.protocol === 'file:'")

    def key(self, name, text=None):
        """Presses and lets go of a key."""
        codes = {"ArrowLeft": 37, "ArrowUp": 38, "ArrowRight": 39, "ArrowDown": 40, "Tab": 9, "Escape": 27, " ": 32, "Home": 36, "End": 35}
        common = {"key": name, "windowsVirtualKeyCode": codes.get(name, ord(name[0])), "code": "Space" if name == " " else name}
        self.send("Input.dispatchKeyEvent", type="keyDown", **common, **({"text": text or name} if len(name) == 1 else {}))
        self.send("Input.dispatchKeyEvent", type="keyUp", **common)

    def point_at(self, x, y):
        """Moves the mouse."""
        self.send("Input.dispatchMouseEvent", type="mouseMoved", x=x, y=y)

    def complaints(self):
        """Errors and warnings of scripts, of the policy, of loading, and requests that leave the file."""
        found = []
        for event in self.events:
            method, params = event["method"], event.get("params", {})
            if method == "Runtime.exceptionThrown":
                details = params["exceptionDetails"]
                found.append("exception: " + (details.get("exception", {}).get("description") or details["text"]))
            elif method == "Runtime.consoleAPICalled" and params["type"] in ("error", "warning", "assert"):
                found.append("console: " + " ".join(str(a.get("value", a.get("description"))) for a in params["args"]))
            elif method == "Log.entryAdded" and params["entry"]["level"] in ("error", "warning"):
                found.append("log: " + params["entry"]["text"])
            elif method == "Network.requestWillBeSent":
                url = params["request"]["url"]
                if not url.startswith(("file:", "data:", "blob:", "about:")):
                    found.append("request: " + url)
        return found

    def picture(self, whole=True):
        """The page as PNG bytes."""
        import base64

        options = {"format": "png", "captureBeyondViewport": whole}
        if whole:
            size = self.send("Page.getLayoutMetrics")["cssContentSize"]
            options["clip"] = {"x": 0, "y": 0, "width": size["width"], "height": min(size["height"], 16000), "scale": 1}
        return base64.b64decode(self.send("Page.captureScreenshot", **options)["data"])

    def paper(self):
        """The page printed on A4, as PDF bytes."""
        import base64

        data = self.send("Page.printToPDF", preferCSSPageSize=True, printBackground=True)["data"]
        return base64.b64decode(data)
