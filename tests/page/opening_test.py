"""Every system's page opens, alone and without a complaint."""

import unittest

from browser import SYSTEMS, PageTest
from snapshots import snapshot


class Opening(PageTest):
    def test_says_nothing_on_the_console(self):
        for system in SYSTEMS:
            with self.subTest(system):
                self.assertEqual(snapshot(system).console, [])

    def test_asks_nothing_of_the_network(self):
        for system in SYSTEMS:
            with self.subTest(system):
                self.assertEqual(snapshot(system).requests, [])

    def test_is_light(self):
        for system in SYSTEMS:
            with self.subTest(system):
                self.assertLess(self.browser.path(system).stat().st_size, 1_500_000)

    def test_has_its_six_sections_in_their_order(self):
        self.open("fog-bank-lidar")
        self.assertEqual(self.texts("main h2"), [
            "Does it meet?", "Where does the light go?", "Which ghosts matter?", "What happens to polarization?",
            "What do the coatings do?", "On what basis?"])


if __name__ == "__main__":
    unittest.main()
