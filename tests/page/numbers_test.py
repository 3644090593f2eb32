"""What the page shows is what the commands say."""

import json
import unittest

from browser import RAYS, SYSTEMS, PageTest, run, system_file


def lookup(data, path):
    """The value at a path such as check.requirements[0].value below the commands' documents."""
    command = path.split(".")[0].split("[")[0]
    value = data[command]
    for key in path.replace("[", ".").replace("]", "").split("."):
        value = value[int(key)] if isinstance(value, list) else value[key]
    return value


class Numbers(PageTest):
    def data(self):
        return json.loads(self.text("#data"))

    def test_embeds_the_documents_of_the_commands(self):
        for system in SYSTEMS:
            with self.subTest(system):
                self.open(system)
                budget = json.loads(run("budget", system_file(system), *RAYS, "--json", "-"))["budget"]
                embedded = self.data()["budget"]["budget"]
                embedded.pop("ledgers")
                self.assertEqual(embedded, budget)

    def test_embeds_both_splits(self):
        self.open("tide-pool-camera")
        ledgers = self.data()["budget"]["budget"]["ledgers"]
        for split in ("wavelength", "field"):
            document = json.loads(run("budget", system_file("tide-pool-camera"), *RAYS, "--split", split, "--json", "-"))
            expected = document["budget"]["ledgers"]
            self.assertEqual([entry for entry in ledgers if expected[0].keys() == entry.keys()], expected)

    def test_marked_figures_are_those_of_the_documents(self):
        for system in SYSTEMS:
            with self.subTest(system):
                self.open(system)
                data = self.data()
                marked = self.all("[data-quantity]")
                self.assertGreater(len(marked), 1)
                for element in marked:
                    value = lookup(data, element.get_attribute("data-quantity"))
                    full = "does not exist" if value is None else value
                    title = element.get_attribute("title")
                    self.assertEqual(title if value is None else float(title), full)
                    if value not in (None, 0):
                        self.assertAlmostEqual(float(element.text) / value, 1.0, delta=1e-3)

    def test_ledger_holds_every_station_s_powers(self):
        for system in SYSTEMS:
            with self.subTest(system):
                self.open(system)
                stations = self.data()["budget"]["budget"]["stations"]
                rows = self.ask("""return Array.from(document.querySelectorAll('#ledger-table tbody tr')).map(row =>
                    Array.from(row.querySelectorAll('td.power')).map(cell => [cell.dataset.column, Number(cell.title), cell.textContent]))""")
                self.assertEqual(len(rows), len(stations))
                for row, station in zip(rows, stations):
                    for column, full, shown in row:
                        self.assertEqual(full, station[column])
                        expected = "–" if full == 0 else "<0.0001" if abs(full) < 0.5e-4 else f"{full:.4f}"
                        self.assertEqual(shown, expected)

    def test_a_wavelength_s_ledger_is_its_own(self):
        self.open("tide-pool-camera", "#wavelength=650")
        entry = next(e for e in self.data()["budget"]["budget"]["ledgers"] if e.get("wavelength_nm") == 650)
        shown = self.ask("""return Array.from(document.querySelectorAll('td[data-column=onward]')).map(cell => Number(cell.title))""")
        self.assertEqual(shown, [station["onward"] for station in entry["stations"]])

    def test_verdicts_are_those_of_check(self):
        for system in SYSTEMS:
            with self.subTest(system):
                self.open(system)
                words = {True: "met", False: "not met", None: "cannot be told"}
                expected = [words[row["met"]] for row in self.data()["check"]["check"]["requirements"]]
                self.assertEqual(self.texts("#verdicts .word"), expected)


if __name__ == "__main__":
    unittest.main()
