"""Reads well: widths, contrast, names for screen readers, print, drawings without overlaps."""

import unittest

from browser import SYSTEMS, PageTest
from snapshots import snapshot

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
        for system in SYSTEMS:
            for width, needed in snapshot(system).scroll_widths.items():
                with self.subTest(system, width=width):
                    self.assertLessEqual(needed, width)

    def test_text_has_contrast_in_light_and_dark(self):
        for system in SYSTEMS:
            with self.subTest(system):
                self.assertEqual(snapshot(system).poor_contrast, {"dark": [], "light": []})

    def test_everything_that_can_be_reached_has_a_name(self):
        for system in SYSTEMS:
            with self.subTest(system):
                self.assertEqual(snapshot(system).nameless, [])

    def test_pictures_have_a_title_and_a_description(self):
        for system in SYSTEMS:
            with self.subTest(system):
                self.assertEqual(snapshot(system).undescribed, 0)

    def test_names_in_the_drawing_do_not_overlap(self):
        for system in SYSTEMS:
            with self.subTest(system):
                labels = snapshot(system).labels
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
