"""What there is to read on each system's page, taken once: most tests only look at it."""

import functools
import json

from browser import chromium

WIDTHS = (360, 768, 1280)

MARKED = """
return Array.from(document.querySelectorAll("[data-quantity]")).map((e) => [e.dataset.quantity, e.title, e.textContent]);
"""

LEDGER = """
return Array.from(document.querySelectorAll("#ledger-table tbody tr")).map((row) =>
  Array.from(row.querySelectorAll("td.power")).map((cell) => [cell.dataset.column, Number(cell.title), cell.textContent]));
"""

# Text whose contrast with its paper is below WCAG's AA.
CONTRASTS = """
const parse = (words) => { const n = words.match(/[\\d.]+/g).map(Number); return n.length === 3 ? n.concat(1) : n; };
const linear = (v) => v <= 10.3 ? v / 255 / 12.92 : Math.pow((v / 255 + 0.055) / 1.055, 2.4);
const luminance = (c) => 0.2126 * linear(c[0]) + 0.7152 * linear(c[1]) + 0.0722 * linear(c[2]);
const paper = (element) => {
  for (let e = element; e; e = e.parentElement) {
    const colour = parse(getComputedStyle(e).backgroundColor);
    if (colour[3] === 1) return colour;
  }
  return [255, 255, 255, 1];
};
const poor = [];
const walker = document.createTreeWalker(document.body, NodeFilter.SHOW_TEXT);
while (walker.nextNode()) {
  const element = walker.currentNode.parentElement;
  if (!walker.currentNode.textContent.trim() || element.closest("script, style, noscript, title, desc, .visually-hidden, .skip")) continue;
  if (!element.getClientRects().length) continue;
  const style = getComputedStyle(element);
  const inside = element.closest("svg");
  const ink = parse(inside ? style.fill : style.color);
  const one = luminance(ink), other = luminance(paper(inside || element));
  const ratio = (Math.max(one, other) + 0.05) / (Math.min(one, other) + 0.05);
  if (ratio < 4.5) poor.push([walker.currentNode.textContent.trim().slice(0, 30), ratio.toFixed(2)]);
}
return poor;
"""

NAMELESS = """
const name = (e) => e.getAttribute("aria-label") || e.textContent.trim() || (e.labels && e.labels.length && e.labels[0].textContent) || e.getAttribute("title");
return Array.from(document.querySelectorAll("a, button, select, input, [role=button], [role=option], [role=listbox], [tabindex='0'], svg[role=group], svg[role=img]"))
  .filter((e) => !name(e)).map((e) => e.outerHTML.slice(0, 120));
"""

UNDESCRIBED = """
return Array.from(document.querySelectorAll("main svg")).filter((s) => s.getAttribute("aria-hidden") !== "true" &&
  !s.getAttribute("aria-label") && !(s.querySelector(":scope > title") && s.querySelector(":scope > desc"))).length;
"""

# Corners of all labels of the drawing, turned ones too.
LABELS = """
return Array.from(document.querySelectorAll("#drawing .station > text")).map((text) => {
  const box = text.getBBox(), matrix = text.getScreenCTM();
  return [[0, 0.2], [1, 0.2], [1, 0.85], [0, 0.85]].map(([x, y]) => {
    const point = new DOMPoint(box.x + x * box.width, box.y + y * box.height).matrixTransform(matrix);
    return [point.x, point.y];
  });
});
"""


class Snapshot:
    """A page with its second station and its first ghost chosen."""

    def __init__(self, system):
        browser = chromium()
        browser.size(1280)
        browser.media(prefers_color_scheme="light")
        browser.open(system, "#station=2&ghost=1")
        self.console = browser.driver.get_log("browser")
        self.requests = browser.requests()
        self.data = json.loads(browser.ask("return document.getElementById('data').textContent"))
        self.marked = browser.ask(MARKED)
        self.ledger = browser.ask(LEDGER)
        self.verdicts = browser.ask("return Array.from(document.querySelectorAll('#verdicts .word')).map(e => e.textContent)")
        self.nameless = browser.ask(NAMELESS)
        self.undescribed = browser.ask(UNDESCRIBED)
        self.labels = browser.ask(LABELS)
        self.poor_contrast = {}
        for scheme in ("dark", "light"):
            browser.media(prefers_color_scheme=scheme)
            self.poor_contrast[scheme] = browser.ask(CONTRASTS)
        self.scroll_widths = {}
        for width in WIDTHS:
            browser.size(width)
            self.scroll_widths[width] = browser.ask("return document.documentElement.scrollWidth")


@functools.lru_cache(maxsize=None)
def snapshot(system):
    return Snapshot(system)
