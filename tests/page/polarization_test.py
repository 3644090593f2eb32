"""Ellipses, the sphere, attribution and maps."""

import json
import unittest

from selenium.webdriver.common.action_chains import ActionChains
from selenium.webdriver.common.keys import Keys

from browser import RAYS, PageTest, run, system_file


class Polarization(PageTest):
    system = "relay-terminal"

    def setUp(self):
        super().setUp()
        self.open(self.system)

    def document(self):
        return json.loads(self.text("#data"))["polarization"]["polarization"]

    def test_is_that_of_the_command(self):
        document = json.loads(run("polarization", system_file(self.system), *RAYS, "--json", "-"))
        self.assert_same(self.document(), document["polarization"])

    def test_draws_an_ellipse_a_station_with_arrowheads(self):
        stations = self.document()["chief"]["stations"]
        self.assertEqual(len(self.all("#polarization .ellipse")), len(stations) + 1)
        turning = [s for s in stations if s["ellipticity_deg"] is not None and abs(s["ellipticity_deg"]) > 0.5]
        self.assertEqual(len(self.all("#polarization .arrow")), len(turning))

    def test_says_handedness_as_ieee_does(self):
        for station, told in zip(self.document()["chief"]["stations"], self.texts("#polarization .cell title")[1:]):
            if abs(station["ellipticity_deg"]) > 0.05:
                self.assertIn("right-handed (IEEE)" if station["ellipticity_deg"] > 0 else "left-handed (IEEE)", told)

    def test_the_sphere_turns_by_keys_and_leaves_the_station(self):
        place = "const c = document.querySelector('#sphere .sphere-point'); return [c.getAttribute('cx'), c.getAttribute('cy')]"
        before = self.ask(place)
        self.ask("document.querySelector('#sphere svg').focus()")
        ActionChains(self.browser.driver).send_keys(Keys.ARROW_LEFT, Keys.ARROW_UP).perform()
        self.assertNotEqual(self.ask(place), before)
        self.assertEqual(self.ask("return location.hash"), "")

    def test_an_ellipse_chooses_its_station(self):
        self.ask("""document.querySelectorAll('#polarization .cell[role=button]')[3].dispatchEvent(new MouseEvent('click', {bubbles: true}))""")
        self.assertEqual(self.ask("return location.hash"), "#station=3")

    def test_maps_of_the_pupil_are_shown(self):
        self.assertGreater(self.ask("""return Array.from(document.querySelectorAll('.maps img')).filter(i => {
            i.loading = 'eager'; return i.src.startsWith('data:image/png;base64,'); }).length"""), 0)

    def test_unpolarized_light_has_no_ellipse_but_a_sentence(self):
        self.open("tide-pool-camera")
        self.assertEqual(self.all("#polarization .ellipse"), [])
        self.assertIn("unpolarized", self.text("#unpolarized"))


if __name__ == "__main__":
    unittest.main()
