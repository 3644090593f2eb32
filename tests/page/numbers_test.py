"""What the page shows is what the commands say."""

import json
import unittest

from browser import RAYS, SYSTEMS, PageTest, run, system_file
from snapshots import snapshot


def lookup(data, path):
    """The value at a path such as check.requirements[0].value below the commands' documents."""
    command = path.split(".")[0].split("[")[0]
    value = data[command]
    for key in path.replace("[", ".").replace("]", "").split("."):
        value = value[int(key)] if isinstance(value, list) else value[key]
    return value


class Numbers(PageTest):
    def test_embeds_the_documents_of_the_commands(self):
        for system in SYSTEMS:
            with self.subTest(system):
                budget = json.loads(run("budget", system_file(system), *RAYS, "--json", "-"))["budget"]
                embedded = dict(snapshot(system).data["budget"]["budget"])
                embedded.pop("ledgers")
                self.assert_same(embedded, budget)

    def test_embeds_both_splits(self):
        ledgers = snapshot("tide-pool-camera").data["budget"]["budget"]["ledgers"]
        for split in ("wavelength", "field"):
            document = json.loads(run("budget", system_file("tide-pool-camera"), *RAYS, "--split", split, "--json", "-"))
            expected = document["budget"]["ledgers"]
            self.assert_same([entry for entry in ledgers if expected[0].keys() == entry.keys()], expected)

    def test_marked_figures_are_those_of_the_documents(self):
        for system in SYSTEMS:
            with self.subTest(system):
                self.assertGreater(len(snapshot(system).marked), 1)
                for path, title, shown in snapshot(system).marked:
                    value = lookup(snapshot(system).data, path)
                    if value is None:
                        self.assertEqual((title, shown), ("does not exist", "–"))
                    else:
                        self.assertEqual(float(title), value)
                        self.assertAlmostEqual(float(shown), value, delta=0.5e-3 * abs(value))

    def test_ledger_holds_every_station_s_powers(self):
        for system in SYSTEMS:
            with self.subTest(system):
                stations = snapshot(system).data["budget"]["budget"]["stations"]
                self.assertEqual(len(snapshot(system).ledger), len(stations))
                for row, station in zip(snapshot(system).ledger, stations):
                    for column, full, shown in row:
                        self.assertEqual(full, station[column])
                        expected = "–" if full == 0 else "<0.0001" if abs(full) < 0.5e-4 else f"{full:.4f}"
                        self.assertEqual(shown, expected)

    def test_a_wavelength_s_ledger_is_its_own(self):
        ledgers = snapshot("tide-pool-camera").data["budget"]["budget"]["ledgers"]
        entry = next(e for e in ledgers if e.get("wavelength_nm") == 650)
        self.open("tide-pool-camera", "#wavelength=650")
        shown = self.ask("return Array.from(document.querySelectorAll('td[data-column=onward]')).map(cell => Number(cell.title))")
        self.assertEqual(shown, [station["onward"] for station in entry["stations"]])

    def test_verdicts_are_those_of_check(self):
        words = {True: "met", False: "not met", None: "cannot be told"}
        for system in SYSTEMS:
            with self.subTest(system):
                rows = snapshot(system).data["check"]["check"]["requirements"]
                self.assertEqual(snapshot(system).verdicts, [words[row["met"]] for row in rows])


if __name__ == "__main__":
    unittest.main()
