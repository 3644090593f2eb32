"""Reads well: widths, contrast, names for screen readers, print, drawings without overlaps."""

import unittest

from browser import SYSTEMS, PageTest

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


def apart(one, other):
    """Whether an edge of either rectangle separates the two (separating axis theorem)."""
    for corners in (one, other):
        for (x1, y1), (x2, y2) in ((corners[0], corners[1]), (corners[1], corners[2])):
            axis = (y1 - y2, x2 - x1)
            a = [axis[0] * x + axis[1] * y for x, y in one]
            b = [axis[0] * x + axis[1] * y for x, y in other]
            if max(a) <= min(b) or max(b) <= min(a):
                return True
    return False


class Reading(PageTest):
    def test_never_scrolls_sideways_as_a_whole(self):
        for width in (360, 768, 1280):
            self.browser.size(width)
            for system in SYSTEMS:
                with self.subTest(system, width=width):
                    self.open(system)
                    self.assertLessEqual(self.ask("return document.documentElement.scrollWidth"), width)

    def test_text_has_contrast_in_light_and_dark(self):
        for scheme in ("light", "dark"):
            self.browser.media(prefers_color_scheme=scheme)
            for system in SYSTEMS:
                with self.subTest(system, scheme=scheme):
                    self.open(system, "#station=2&ghost=1")
                    self.assertEqual(self.ask(CONTRASTS), [])

    def test_everything_that_can_be_reached_has_a_name(self):
        for system in SYSTEMS:
            with self.subTest(system):
                self.open(system)
                self.assertEqual(self.ask(NAMELESS), [])

    def test_pictures_have_a_title_and_a_description(self):
        self.open("tide-pool-camera")
        self.assertEqual(self.ask("""return Array.from(document.querySelectorAll('main svg')).filter(s =>
            s.getAttribute('aria-hidden') !== 'true' && !s.getAttribute('aria-label') &&
            !(s.querySelector(':scope > title') && s.querySelector(':scope > desc'))).length"""), 0)

    def test_names_in_the_drawing_do_not_overlap(self):
        for system in SYSTEMS:
            with self.subTest(system):
                self.open(system)
                labels = self.ask(LABELS)
                self.assertGreater(len(labels), 2)
                for i, one in enumerate(labels):
                    for other in labels[:i]:
                        self.assertTrue(apart(one, other), (one, other))

    def test_prints_black_on_white_with_patterns(self):
        self.browser.media("print", prefers_color_scheme="dark")
        self.open("fog-bank-lidar")
        self.assertEqual(self.ask("return getComputedStyle(document.body).backgroundColor"), "rgb(255, 255, 255)")
        self.assertEqual(self.ask("return getComputedStyle(document.querySelector('nav')).display"), "none")
        self.assertEqual(self.ask("return getComputedStyle(document.querySelector('#loss-absorbed rect')).fill"), "rgb(255, 255, 255)")

    def test_right_and_left_say_whose(self):
        self.open("relay-terminal")
        for words in self.ask("""return Array.from(document.querySelectorAll('#polarization-body title, #polarization-body td'))
                .map(e => e.textContent).filter(t => /handed/.test(t))"""):
            self.assertIn("(IEEE)", words)

    def test_lasers_have_their_caution(self):
        self.open("relay-terminal")
        self.assertIn("IEC 60825-1", self.text("#basis-body"))


if __name__ == "__main__":
    unittest.main()
