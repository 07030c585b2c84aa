"""Opens report pages in a headless Chromium and holds what they show against the files of their folders.

    python3 tests/browser/pages.py lenzbore

runs the program on cases of every kind, and checks of each page: no complaint of script, policy or network; no sideways scroll at
1280 and 390 dots; under 5 MB; nothing of a case acts on the page; the slider moves the field; hover, keys and the typed place read
the numbers that run.h5 holds in that cell; it prints.
"""

import csv
import json
import os
import subprocess
import sys
import tempfile

import h5py

sys.path.insert(0, os.path.dirname(__file__))
from chromium import Browser, Trouble

HERE = os.path.dirname(os.path.abspath(__file__))
EXAMPLES = os.path.join(os.path.dirname(os.path.dirname(HERE)), "examples")
LARGEST = 5_000_000
READING = "document.getElementById('field-reading')"


class Fault(Exception):
    """The page is not as it should be."""


def require(holds, message):
    if not holds:
        raise Fault(message)


def make(program, place):
    """Result folders of every kind, by name."""
    hostile = os.path.join(HERE, "case.toml")
    example = lambda name: os.path.join(EXAMPLES, name)
    asked = {
        "traverse": ["run", hostile],
        "curve": ["curve", hostile],
        "ladder": ["ladder", hostile, "--curve"],
        "free": ["run", example("latch-damper.toml")],
        "steady": ["run", example("two-layer-steady.toml")],
        "alternating": ["run", example("coil-probe.toml")],
        "strokes": ["run", example("stroke-damper.toml")],
        "compare": ["compare", example("arrest-sleeve.toml"), example("arrest-sleeve-calculator.csv")],
    }
    folders = {}
    for name, words in asked.items():
        folder = os.path.join(place, name)
        end = subprocess.run([program, *words, "--out", folder], stdout=subprocess.DEVNULL, stderr=subprocess.PIPE, text=True)
        # 1: the table falls short, as the example's does.
        require(end.returncode in (0, 1), f"{words} ended with {end.returncode}: {end.stderr}")
        folders[name] = folder
    return folders


def ready(browser, page, width):
    browser.events.clear()
    browser.open(page, width)
    browser.wait_for("document.documentElement.dataset.ready")
    require(browser.evaluate("document.documentElement.dataset.ready") == "yes", f"{page} did not get ready: {browser.complaints()}")
    require(not browser.complaints(), f"{page} at {width}: {browser.complaints()}")


def looks(browser, name, page):
    """What holds for every page."""
    size = os.path.getsize(page)
    require(size < LARGEST, f"{name}: {size} bytes")
    for width in (390, 1280):
        ready(browser, page, width)
        wide = browser.evaluate("document.documentElement.scrollWidth")
        require(wide <= width, f"{name}: {wide} dots wide in a window of {width}")
    require(browser.evaluate("document.querySelectorAll('main section').length") >= 4, f"{name}: sections are missing")
    charts = browser.evaluate("document.querySelectorAll('[data-chart]').length")
    drawn = browser.evaluate("document.querySelectorAll('[data-chart].js-plotly-plot').length")
    folded = browser.evaluate("document.querySelectorAll('details:not([open]) [data-chart]').length")
    require(drawn == charts - folded, f"{name}: {drawn} of {charts} charts are drawn, {folded} folded")
    unnamed = browser.evaluate("[...document.querySelectorAll('button,select,input,[role=application]')].filter(e => !(e.ariaLabel || e.labels?.length || e.textContent.trim())).length")
    require(unnamed == 0, f"{name}: {unnamed} controls have no name")
    twice = browser.evaluate("(() => { const all = [...document.querySelectorAll('[id]')].map(e => e.id); return all.filter((id, i) => id && all.indexOf(id) !== i && !document.getElementById(id).closest('.js-plotly-plot')).length; })()")
    require(twice == 0, f"{name}: {twice} names stand twice")
    require(len(browser.paper()) > 20_000, f"{name}: nothing on paper")
    require(not browser.complaints(), f"{name} on paper: {browser.complaints()}")


def unharmed(browser, name, folder):
    """Texts of the case are shown as they were written."""
    with open(os.path.join(folder, "summary.json")) as file:
        summary = json.load(file)
    require(browser.evaluate("document.title") == summary["title"], f"{name}: the title acts")
    require(browser.evaluate("document.querySelector('h1').textContent") == summary["title"], f"{name}: the title is not shown")
    shown = browser.evaluate("document.querySelector('main').textContent")
    for text in [*summary["record"].values(), summary["geometry"]["wall"]["layers"][0]["name"]]:
        require(text in shown, f"{name}: '{text}' is not shown")
    require(browser.evaluate("document.querySelectorAll('main img[src=x], main i, main b b, svg[onload]').length") == 0, f"{name}: a text became an element")


def reads(browser, name, folder):
    """The cell that is read holds what run.h5 holds."""
    said = browser.evaluate(f"({{...{READING}.dataset}})")
    require("instant" in said, f"{name}: nothing was read")
    with h5py.File(os.path.join(folder, "run.h5")) as file:
        at = (int(said["instant"]), int(said["row"]), int(said["column"]))
        for key, value in said.items():
            if key.startswith("value_"):
                stored = file["snapshots"][key[len("value_"):]][at]
                require(abs(float(value) - stored) <= 1e-6 * abs(stored), f"{name}: {key} {value} in cell {at}, stored {stored}")
        edges = file["grid/r_m"][:]
        radius = 500 * (edges[at[2]] + edges[at[2] + 1])
    shown = browser.evaluate(f"{READING}.textContent")
    require(f"r {radius:.4g}"[:5] in shown, f"{name}: radius {radius} is not in {shown}")
    return said


def plays(browser, name, folder):
    """Slider, play, hover, keys and the typed place."""
    count = int(browser.evaluate("document.getElementById('field-instant').max")) + 1
    box = browser.evaluate("(() => { document.getElementById('field-plot').scrollIntoView({behavior: 'instant', block: 'center'}); const b = document.querySelector('#field-plot .nsewdrag').getBoundingClientRect(); return [b.x, b.y, b.width, b.height]; })()")
    # Into the wall, on the right half, in the middle of the picture.
    x, y, wide, high = box
    seen = set()
    for across in (0.52, 0.8, 0.9, 0.1):
        browser.point_at(x + across * wide, y + 0.45 * high)
        browser.wait_for(f"{READING}.dataset.row !== undefined")
        browser.evaluate("new Promise(done => setTimeout(done, 150))")
        said = reads(browser, name, folder)
        seen.add((said["row"], said["column"]))
    require(len(seen) >= 3, f"{name}: hover reads the same cell everywhere")
    browser.evaluate("document.getElementById('field-plot').focus({preventScroll: true})")
    before = browser.evaluate(f"{READING}.dataset.row")
    browser.key("ArrowUp")
    browser.wait_for(f"{READING}.dataset.row !== '{before}'")
    reads(browser, name, folder)
    with h5py.File(os.path.join(folder, "run.h5")) as file:
        numbers = file["regions/number"][:]
        rows, columns = (numbers > 0).nonzero()
        middle = len(rows) // 2
        r, z = file["grid/r_m"][:], file["grid/z_m"][:]
        at = (500 * (r[columns[middle]] + r[columns[middle] + 1]), 500 * (z[rows[middle]] + z[rows[middle] + 1]))
    browser.evaluate(f"(() => {{ document.getElementById('field-r').value = {at[0]}; document.getElementById('field-z').value = {at[1]}; document.getElementById('field-place').requestSubmit(); return new Promise(done => setTimeout(done, 200)); }})()")
    said = reads(browser, name, folder)
    require(int(said["column"]) == columns[middle], f"{name}: column {said['column']} read, {columns[middle]} asked")
    if count < 2:
        return
    first = browser.evaluate("JSON.stringify(document.getElementById('field-plot').data[0].z)")
    browser.evaluate("document.getElementById('field-instant').focus()")
    instant = browser.evaluate("document.getElementById('field-instant').value")
    browser.key("End" if instant == "0" else "Home")
    browser.wait_for(f"document.getElementById('field-instant').value !== '{instant}'")
    browser.evaluate("new Promise(done => setTimeout(done, 200))")
    require(browser.evaluate("JSON.stringify(document.getElementById('field-plot').data[0].z)") != first, f"{name}: the slider does not move the field")
    browser.key("Home")
    browser.wait_for("document.getElementById('field-instant').value === '0'")
    # What the button said meanwhile is kept: a run of two instants is over in a second.
    button = "document.getElementById('field-play')"
    browser.evaluate(f"window.told = []; new MutationObserver(() => told.push({button}.getAttribute('aria-pressed'))).observe({button}, {{attributes: true}})")
    browser.key(" ")
    browser.wait_for("Number(document.getElementById('field-instant').value) >= 1")
    require(browser.evaluate("told[0]") == "true", f"{name}: space does not play")
    if browser.evaluate(f"{button}.getAttribute('aria-pressed')") == "true":
        browser.key(" ")
    browser.wait_for(f"{button}.getAttribute('aria-pressed') === 'false'")


def charted(browser, name, folder, file, x, y):
    """The first chart of a table shows the table's numbers, and arrow keys say them."""
    with open(os.path.join(folder, file), newline="") as table:
        rows = list(csv.DictReader(table))
    place = f"document.querySelector('[data-chart^=\"{name}\"]')"
    browser.evaluate(f"{place}.focus()")
    browser.key("Home")
    said = browser.evaluate(f"{place}.parentElement.querySelector('.reading').textContent")
    for column in (x, y):
        number = float(rows[0][column])
        require(any(text in said for text in (f"{number:.4g}", f"{number:.3g}")), f"{name}: {column} {number} is not in '{said}'")


def main(program):
    with tempfile.TemporaryDirectory() as place, Browser() as browser:
        folders = make(os.path.abspath(program), place)
        for name, folder in folders.items():
            looks(browser, name, os.path.join(folder, "report.html"))
            if name in ("traverse", "curve", "ladder"):
                unharmed(browser, name, folder)
            if os.path.exists(os.path.join(folder, "run.h5")):
                plays(browser, name, folder)
            if name == "curve":
                charted(browser, "force-speed", folder, "curve.csv", "speed_m_per_s", "drag_N")
            require(not browser.complaints(), f"{name}: {browser.complaints()}")
            print(f"{name}: {os.path.getsize(os.path.join(folder, 'report.html'))} bytes, as it should be")


if __name__ == "__main__":
    try:
        main(sys.argv[1])
    except (Fault, Trouble) as trouble:
        sys.exit(f"the report page: {trouble}")
