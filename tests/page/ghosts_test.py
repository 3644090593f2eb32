"""The ghosts' plot, table, filter, rays, spot and cure."""

import json
import unittest

from selenium.webdriver.common.action_chains import ActionChains
from selenium.webdriver.common.keys import Keys

from browser import RAYS, PageTest, run, system_file


class Ghosts(PageTest):
    system = "fog-bank-lidar"

    def setUp(self):
        super().setUp()
        self.open(self.system)

    def paths(self):
        return json.loads(self.text("#data"))["ghosts"]["ghosts"]["paths"]

    def rows(self):
        return self.ask("return Array.from(document.querySelectorAll('#ghost-table tbody tr')).map(r => Number(r.dataset.ghost))")

    def sort_by(self, heading):
        self.ask("""Array.from(document.querySelectorAll('#ghost-table th button')).find(b => b.textContent === arguments[0]).click()""", heading)

    def filter(self, words):
        self.ask("""const f = document.querySelector('#ghost-filter'); f.value = arguments[0]; f.dispatchEvent(new Event('input'))""", words)

    def test_are_those_of_the_command(self):
        document = json.loads(run("ghosts", system_file(self.system), *RAYS, "--json", "-"))
        embedded = json.loads(self.text("#data"))["ghosts"]["ghosts"]
        self.assert_same(embedded, document["ghosts"])

    def test_table_shows_their_figures(self):
        shown = self.ask("""return Array.from(document.querySelectorAll('#ghost-table tbody tr')).map(r =>
            Number(r.children[2].title))""")
        self.assertEqual(shown, [path["relative_power"] for path in self.paths()])

    def test_sorts_by_any_column_both_ways(self):
        radii = {index + 1: path["rms_radius_mm"] for index, path in enumerate(self.paths())}
        self.sort_by("rms radius, mm")
        self.assertEqual(self.rows(), sorted(radii, key=lambda n: (radii[n], n)))
        self.assertEqual(self.ask("return document.querySelector('#ghost-table th[aria-sort]').getAttribute('aria-sort')"), "ascending")
        self.sort_by("rms radius, mm")
        self.assertEqual(self.rows(), sorted(radii, key=lambda n: (-radii[n], n)))
        self.assertEqual(self.ask("return document.querySelector('#ghost-table th[aria-sort]').getAttribute('aria-sort')"), "descending")

    def test_filters_by_a_station_s_name(self):
        self.filter("window")
        expected = [i + 1 for i, path in enumerate(self.paths()) if any("window" in name for name in path["bounces"])]
        self.assertEqual(self.rows(), expected)
        self.assertTrue(self.text("#ghost-count").startswith(f"{len(expected)} of "))

    def test_filters_by_power(self):
        self.ask("""const s = document.querySelector('#ghost-least'); s.value = '0.000001'; s.dispatchEvent(new Event('change'))""")
        self.assertEqual(self.rows(), [i + 1 for i, path in enumerate(self.paths()) if path["relative_power"] >= 1e-6])

    def test_choosing_one_draws_its_rays_and_shows_its_spot(self):
        self.ask("document.querySelector(\"#ghost-table tr[data-ghost='1']\").click()")
        self.assertEqual(self.ask("return location.hash"), "#ghost=1")
        self.assertGreater(len(self.all("#drawing .chosen-ghost")), 0)
        self.assertGreater(len(self.all("#ghost-detail .spot-ghost")), 0)
        self.assertIn(self.paths()[0]["bounces"][0], self.text("#ghost-detail h3"))

    def test_says_what_would_cure_it(self):
        self.open(self.system, "#ghost=1")
        path = self.paths()[0]
        words = self.text("#cure")
        for name, reflectance in zip(path["bounces"], path["reflectances"]):
            self.assertIn(f"{name} from R = {reflectance:#.4g}", words)

    def test_points_in_the_plot_are_chosen_by_keys(self):
        self.ask("document.querySelector(\"#ghosts .dot[data-ghost='1']\").focus()")
        ActionChains(self.browser.driver).send_keys(Keys.ARROW_DOWN, Keys.ARROW_DOWN).perform()
        self.assertEqual(self.ask("return location.hash"), "#ghost=2")
        ActionChains(self.browser.driver).send_keys(Keys.ESCAPE).perform()
        self.assertEqual(self.ask("return location.hash"), "")
        self.assertEqual(self.all("#drawing .chosen-ghost"), [])

    def test_keys_follow_the_order_of_the_table(self):
        self.sort_by("rms radius, mm")
        order = self.rows()
        self.ask("document.querySelector(\"#ghost-table tbody tr\").focus()")
        ActionChains(self.browser.driver).send_keys(Keys.ARROW_DOWN, Keys.ARROW_DOWN).perform()
        self.assertEqual(self.ask("return document.activeElement.dataset.ghost"), str(order[1]))

    def test_tells_what_was_not_followed(self):
        self.assertIn("Not followed: ", self.text("#not-followed"))

    def test_places_of_hot_light_carry_the_caution(self):
        self.assertIn("IEC 60825-1", self.text("#foci"))


if __name__ == "__main__":
    unittest.main()
