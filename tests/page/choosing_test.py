"""Pointing, choosing, keys, and the state in the address."""

import unittest

from selenium.webdriver.common.action_chains import ActionChains
from selenium.webdriver.common.keys import Keys

from browser import PageTest


class Choosing(PageTest):
    def setUp(self):
        super().setUp()
        self.open("fog-bank-lidar")

    def fragment(self):
        return self.ask("return location.hash")

    def keys(self, *keys):
        ActionChains(self.browser.driver).send_keys(*keys).perform()

    def chosen(self, selector):
        return self.ask("return Array.from(document.querySelectorAll(arguments[0])).map(e => e.dataset.station || e.id)", selector)

    def test_pointing_at_the_stream_lights_the_station_everywhere(self):
        target = self.find("#stream [data-station='5'] .station-target")
        self.ask("arguments[0].scrollIntoView({block: 'center'})", target)
        ActionChains(self.browser.driver).move_to_element(target).perform()
        self.assertEqual(self.chosen("#drawing .station.lit"), ["5"])
        self.assertEqual(self.chosen("#ledger-table tr.lit"), ["5"])
        self.assertIn("5 fold; reaches 0.", self.text("#station-figures"))

    def test_pointing_leaves_the_address_alone(self):
        target = self.find("#stream [data-station='5'] .station-target")
        self.ask("arguments[0].scrollIntoView({block: 'center'})", target)
        ActionChains(self.browser.driver).move_to_element(target).perform()
        self.assertEqual(self.fragment(), "")

    def test_a_click_in_the_drawing_chooses_the_station(self):
        self.ask("""document.querySelector("#drawing [id='3'] .hit").dispatchEvent(new MouseEvent('click', {bubbles: true}))""")
        self.assertEqual(self.fragment(), "#station=3")
        for selector in ("#drawing .station.chosen", "#stream .stream-station.chosen", "#ledger-table tr.chosen"):
            self.assertEqual(self.chosen(selector), ["3"])

    def test_arrow_keys_go_from_station_to_station(self):
        self.keys(Keys.ARROW_RIGHT, Keys.ARROW_RIGHT, Keys.ARROW_RIGHT, Keys.ARROW_LEFT)
        self.assertEqual(self.fragment(), "#station=2")
        self.assertIn("2 window rear", self.text("#station-figures"))

    def test_arrow_keys_in_the_stream_move_the_focus(self):
        self.ask("document.querySelector(\"#stream [data-station='1']\").focus()")
        self.keys(Keys.ARROW_RIGHT, Keys.ARROW_RIGHT)
        self.assertEqual(self.ask("return document.activeElement.dataset.station"), "2")

    def test_escape_lets_go(self):
        self.keys(Keys.ARROW_RIGHT, Keys.ESCAPE)
        self.assertEqual(self.fragment(), "")
        self.assertEqual(self.chosen(".chosen"), [])

    def test_a_row_of_the_ledger_is_chosen_by_the_enter_key(self):
        self.ask("document.querySelector(\"#ledger-table tr[data-station='4']\").focus()")
        self.keys(Keys.ENTER)
        self.assertEqual(self.fragment(), "#station=4")

    def test_a_link_opens_the_same_view(self):
        self.open("fog-bank-lidar", "#station=7&unit=dB")
        self.assertEqual(self.chosen("#drawing .station.chosen"), ["7"])
        self.assertEqual(self.find("#choose-unit").get_attribute("value"), "dB")

    def test_an_address_that_asks_for_what_is_not_there_opens_the_plain_view(self):
        for fragment in ("#station=99&ghost=0&wavelength=1&unit=__proto__", "#%E0%A4%A", "#station=-1&field=x"):
            self.open("fog-bank-lidar", fragment)
            self.assertEqual(self.browser.driver.get_log("browser"), [])
            self.assertEqual(self.chosen(".chosen"), [])

    def test_the_unit_changes_the_ledger(self):
        self.ask("""const s = document.querySelector('#choose-unit'); s.value = 'dB'; s.dispatchEvent(new Event('change'))""")
        shown = self.text("#ledger-table tr[data-station='13'] td[data-column=onward]")
        self.assertAlmostEqual(float(shown), -0.887, delta=0.002)

    def test_the_light_changes_stream_and_ledger(self):
        self.open("tide-pool-camera")
        before = self.text("#stream .station-mark ~ text, #stream svg > text:last-of-type")
        self.ask("""const s = document.querySelector('#choose-light'); s.value = 'f3'; s.dispatchEvent(new Event('change'))""")
        self.assertEqual(self.fragment(), "#field=3")
        self.assertIn("field corner alone", self.text("#ledger-table caption"))
        self.assertIn("field corner alone", self.text("#stream title"))
        self.assertTrue(before)

    def test_links_to_sections_keep_the_state(self):
        self.keys(Keys.ARROW_RIGHT)
        self.find("nav a[data-section=coatings]").click()
        self.assertEqual(self.fragment(), "#station=1")
        self.assertEqual(self.ask("return document.activeElement.id"), "coatings")

    def test_a_coating_s_curves_are_read_out_by_keys(self):
        self.ask("document.querySelector('#coatings figure > svg').focus()")
        self.keys(Keys.ARROW_RIGHT)
        self.assertRegex(self.text("#coatings .coating-figures"), r"^\d+(\.\d+)? nm, reflectance: s at ")


if __name__ == "__main__":
    unittest.main()
