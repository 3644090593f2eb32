"""Chromium and the pages it shows: each system's page is written once, one browser serves all tests."""

import json
import os
import pathlib
import subprocess
import tempfile
import unittest

from selenium import webdriver
from selenium.webdriver.chrome.service import Service

ROOT = pathlib.Path(__file__).resolve().parents[2]
PROGRAM = str(ROOT / os.environ.get("LIGHTLEDGER", "build/release/lightledger"))
RAYS = ["--rays", "512"]
SYSTEMS = sorted(path.stem for path in (ROOT / "systems").glob("*.yaml"))


def run(*arguments):
    """What the program prints; it must succeed."""
    return subprocess.run([PROGRAM, *arguments], check=True, capture_output=True, text=True, cwd=ROOT).stdout


def system_file(system):
    return f"systems/{system}.yaml"


class Chromium:
    """One headless browser, and the pages in a folder of their own."""

    def __init__(self):
        self.folder = tempfile.TemporaryDirectory()
        options = webdriver.ChromeOptions()
        options.binary_location = "/usr/bin/chromium"
        for argument in ("--headless=new", "--no-sandbox", "--disable-gpu", "--disable-dev-shm-usage"):
            options.add_argument(argument)
        options.set_capability("goog:loggingPrefs", {"browser": "ALL", "performance": "ALL"})
        self.driver = webdriver.Chrome(service=Service("/usr/bin/chromedriver"), options=options)
        self.size(1280)

    def path(self, system):
        path = pathlib.Path(self.folder.name) / f"{system}.html"
        if not path.exists():
            run("report", system_file(system), *RAYS, "--quiet", "--out", str(path))
        return path

    def open(self, system, fragment=""):
        self.driver.get("about:blank")
        for kind in ("browser", "performance"):
            self.driver.get_log(kind)
        self.driver.get(self.path(system).as_uri() + fragment)

    def size(self, width, height=900):
        self.command("Emulation.setDeviceMetricsOverride", width=width, height=height, deviceScaleFactor=1, mobile=False)

    def media(self, medium="screen", **features):
        self.command("Emulation.setEmulatedMedia", media=medium,
                     features=[{"name": name.replace("_", "-"), "value": value} for name, value in features.items()])

    def command(self, name, **parameters):
        return self.driver.execute_cdp_cmd(name, parameters)

    def ask(self, script, *arguments):
        return self.driver.execute_script(script, *arguments)

    def requests(self):
        """Addresses that the page asked the network for."""
        messages = [json.loads(entry["message"])["message"] for entry in self.driver.get_log("performance")]
        addresses = [m["params"]["request"]["url"] for m in messages if m["method"] == "Network.requestWillBeSent"]
        return [address for address in addresses if not address.startswith(("file:", "data:", "about:"))]

    def close(self):
        self.driver.quit()
        self.folder.cleanup()


_chromium = None


def chromium():
    global _chromium
    if _chromium is None:
        _chromium = Chromium()
        unittest.addModuleCleanup(close)
    return _chromium


def close():
    global _chromium
    if _chromium is not None:
        _chromium.close()
        _chromium = None


class PageTest(unittest.TestCase):
    """Opens pages in the one browser, at desktop width, in light colours."""

    def setUp(self):
        self.browser = chromium()
        self.browser.size(1280)
        self.browser.media(prefers_color_scheme="light")

    def open(self, system, fragment=""):
        self.browser.open(system, fragment)

    def assert_same(self, one, other):
        """The same document, numbers to 1e-12: two runs may round differently."""
        if isinstance(one, dict):
            self.assertEqual(one.keys(), other.keys())
            for key in one:
                self.assert_same(one[key], other[key])
        elif isinstance(one, list):
            self.assertEqual(len(one), len(other))
            for a, b in zip(one, other):
                self.assert_same(a, b)
        elif isinstance(one, float) and isinstance(other, (int, float)):
            self.assertAlmostEqual(one, other, delta=1e-12 * max(1.0, abs(other)))
        else:
            self.assertEqual(one, other)

    def ask(self, script, *arguments):
        return self.browser.ask(script, *arguments)

    def find(self, selector):
        return self.browser.driver.find_element("css selector", selector)

    def all(self, selector):
        return self.browser.driver.find_elements("css selector", selector)

    def text(self, selector):
        return self.ask("return document.querySelector(arguments[0]).textContent", selector)

    def texts(self, selector):
        return self.ask("return Array.from(document.querySelectorAll(arguments[0])).map(e => e.textContent)", selector)
