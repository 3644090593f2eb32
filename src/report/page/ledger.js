// Where does the light go? Controls, the table, and the station that is lit in drawing, stream and table.

function stationWords(row, number) {
  const parts = [`${number} ${row.name}`, `reaches ${power(row.incident)}`, `onward ${power(row.onward)}`];
  losses.forEach((loss) => {
    if (row[loss] !== 0) parts.push(`${loss} ${power(row[loss])} (${perCent(row[loss])})`);
  });
  if (row.incidence_deg)
    parts.push(`incidence ${quantity(row.incidence_deg.min)} to ${quantity(row.incidence_deg.max)} deg, mean ${quantity(row.incidence_deg.mean)}`);
  return parts.join("; ");
}

function tellStation() {
  const number = lit.station || state.station;
  d3.select("#station-figures").text(number === null
    ? "Point at a station, or step through them with the arrow keys: its figures stand here."
    : stationWords(chosenStations()[number - 1], number) + ".");
}

function lightOptions() {
  const options = [{value: "all", words: "all light"}];
  if (wavelengthLedgers.length > 1)
    wavelengthLedgers.forEach((ledger) => options.push({value: "w" + ledger.wavelength_nm, words: plain(ledger.wavelength_nm) + " nm"}));
  if (fieldLedgers.length > 1)
    fieldLedgers.forEach((ledger, index) => options.push({value: "f" + (index + 1), words: fieldName(index)}));
  return options;
}

function lightValue() {
  if (state.wavelength !== null) return "w" + state.wavelength;
  return state.field !== null ? "f" + state.field : "all";
}

function control(parent, words, name, options, onChange) {
  const label = parent.append("label").text(words);
  const select = label.append("select").attr("id", name);
  select.selectAll("option").data(options).enter().append("option").attr("value", (d) => d.value).text((d) => d.words);
  select.on("change", function () { onChange(this.value); });
  return select;
}

function drawLightControls() {
  const parent = d3.select("#light-controls");
  const options = lightOptions();
  const light = options.length > 1 ? control(parent, "Light", "choose-light", options, (value) => choose({
    wavelength: value[0] === "w" ? Number(value.slice(1)) : null,
    field: value[0] === "f" ? Number(value.slice(1)) : null
  })) : null;
  const unit = control(parent, "Powers as", "choose-unit",
    Object.keys(units).map((key) => ({value: key, words: units[key].label})), (value) => choose({unit: value}));
  const update = () => {
    if (light) light.property("value", lightValue());
    unit.property("value", state.unit);
  };
  update();
  watch(update);
}

function ledgerColumns() {
  const shown = losses.filter((loss) => stations.some((station) => station[loss] !== 0));
  return ["incident", "onward"].concat(shown);
}

function drawLedger() {
  const columns = ledgerColumns();
  const made = d3.select("#ledger").append("table").attr("id", "ledger-table");
  const caption = made.append("caption");
  const heading = made.append("thead").append("tr");
  heading.append("th").attr("scope", "col").text("no.");
  heading.append("th").attr("scope", "col").attr("class", "text").text("station");
  columns.forEach((column) => heading.append("th").attr("scope", "col").text(column === "incident" ? "reaches" : column));
  heading.append("th").attr("scope", "col").text("incidence, deg");
  const rows = made.append("tbody").selectAll("tr").data(d3.range(1, stations.length + 1)).enter().append("tr")
    .attr("tabindex", 0).attr("data-station", (d) => d);
  rows.append("td").text((d) => d);
  rows.append("th").attr("scope", "row").attr("class", "text").text((d) => stations[d - 1].name);
  columns.forEach((column) => rows.append("td").attr("class", "power").attr("data-column", column));
  rows.append("td").attr("class", "angle");
  pointsAt(rows, "station", (d) => d);
  rows.on("keydown.choose", (d) => {
    if (d3.event.key !== "Enter" && d3.event.key !== " ") return;
    d3.event.preventDefault();
    choose({station: state.station === d ? null : d});
  });
  const fill = () => {
    const ledger = chosenStations();
    caption.text(`The ledger of ${chosenLightWords()}, in ${units[state.unit].label} of what was launched`);
    rows.each(function (number) {
      const row = ledger[number - 1];
      d3.select(this).selectAll("td.power").each(function () {
        const value = row[this.dataset.column];
        d3.select(this).attr("title", fullPrecision(value)).text(power(value));
      });
      const angles = row.incidence_deg;
      d3.select(this).select("td.angle").text(angles ? `${angles.min.toFixed(2)} to ${angles.max.toFixed(2)}` : dash);
    });
    mark(rows, "station", (d) => d);
    rows.attr("aria-current", (d) => state.station === d ? "true" : null);
  };
  fill();
  watch(fill);
}

function wireDrawing() {
  const groups = d3.selectAll("#drawing .station");
  groups.datum(function () { return Number(this.id); });
  groups.each(function () {
    const group = d3.select(this);
    group.selectAll(".surface, .mirror, .sensor, .stop, .element").nodes().forEach((line) => {
      group.insert("path", "title + *").attr("class", "hit").attr("d", line.getAttribute("d"));
    });
  });
  groups.attr("tabindex", -1).attr("role", "button").attr("aria-label", (d) => stationName(d));
  pointsAt(groups, "station", (d) => d);
  const update = () => {
    mark(groups, "station", (d) => d);
    groups.attr("aria-pressed", (d) => String(state.station === d));
  };
  update();
  watch(update);
}

/** Arrow keys go from station to station; the chosen one is told aloud by the line of figures. */
function stepStation(step) {
  const from = state.station === null ? (step > 0 ? 0 : stations.length + 1) : state.station;
  const next = Math.min(Math.max(from + step, 1), stations.length);
  choose({station: next});
  return next;
}
