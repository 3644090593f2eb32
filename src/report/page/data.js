// The commands' own JSON documents, embedded once.
const data = JSON.parse(document.getElementById("data").textContent);
const budget = data.budget.budget;
const stations = budget.stations;
const ghosts = data.ghosts ? data.ghosts.ghosts : null;
const ghostPaths = ghosts ? ghosts.paths : [];
const polarization = data.polarization ? data.polarization.polarization : null;
const verdicts = data.check.check.requirements;

// In the one order in which losses are shown everywhere.
const losses = ["aside", "absorbed", "clipped", "missed", "scattered", "extra", "bulk"];

function stationName(number) {
  return number + " " + stations[number - 1].name;
}

/** The station's number by its name, null for none. */
function stationNumber(name) {
  const index = stations.findIndex((station) => station.name === name);
  return index < 0 ? null : index + 1;
}

function fieldName(index) {
  const field = budget.by_field[index];
  return field.name === null ? "field " + (index + 1) : "field " + field.name;
}

const wavelengthLedgers = (budget.ledgers || []).filter((ledger) => "wavelength_nm" in ledger);
const fieldLedgers = (budget.ledgers || []).filter((ledger) => !("wavelength_nm" in ledger));

/** The stations' rows of the light that the reader chose: all of it, one wavelength or one field. */
function chosenStations() {
  if (state.wavelength !== null) {
    const ledger = wavelengthLedgers.find((entry) => entry.wavelength_nm === state.wavelength);
    if (ledger) return ledger.stations;
  }
  if (state.field !== null && fieldLedgers[state.field - 1]) return fieldLedgers[state.field - 1].stations;
  return stations;
}

function chosenLightWords() {
  if (state.wavelength !== null) return plain(state.wavelength) + " nm alone";
  if (state.field !== null) return fieldName(state.field - 1) + " alone";
  return "all light";
}
