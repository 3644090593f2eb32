// What happens to polarization?

const attributionKinds = [
  {key: "cross_leakage", heading: "cross leakage", negligible: 1e-6},
  {key: "diattenuation", heading: "diattenuation", negligible: 1e-6},
  {key: "retardance_deg", heading: "retardance, deg", negligible: 1e-3},
  {key: "dop_loss", heading: "loss of polarization", negligible: 1e-6}
];

function matters(row, kind) {
  return row[kind.key] !== null && Math.abs(row[kind.key]) > kind.negligible;
}

/** Below this degree of polarization an ellipse would be a dot. */
const leastPolarized = 0.05;

/** The station to which most of the main figure belongs. */
function worstOffender() {
  const kind = attributionKinds.find((entry) => polarization.attribution.some((row) => matters(row, entry)));
  if (!kind) return null;
  const worst = polarization.attribution.reduce((best, row) => Math.abs(row[kind.key] || 0) > Math.abs(best[kind.key] || 0) ? row : best);
  const number = stationNumber(worst.name);
  return {name: number === null ? worst.name : stationName(number), kind};
}

function tellPolarization(parent) {
  const d = polarization.detector;
  const entry = (path) => ({path: "polarization.detector." + path, value: d[path]});
  const list = parent.append("dl").attr("class", "facts");
  [["degree of polarization", entry("dop")], ["diattenuation", entry("diattenuation")], ["retardance, deg", entry("retardance_deg")],
    ["polarizance", entry("polarizance")], ["depolarization index", entry("depolarization_index")],
    ["extinction", entry("extinction")], ["cross leakage", entry("cross_leakage")]].forEach(([words, figure]) => {
    list.append("dt").text(words);
    list.append("dd").attr("data-quantity", figure.path).attr("title", fullPrecision(figure.value)).text(quantity(figure.value));
  });
}

/** The ellipse that the field draws, as points, from Stokes parameters; the last step carries the arrow. */
function ellipsePoints(azimuth, ellipticity, radius) {
  const turn = azimuth * Math.PI / 180, flat = ellipticity * Math.PI / 180;
  const a = radius * Math.cos(flat), b = radius * Math.sin(flat);
  return d3.range(0, 61).map((step) => {
    const phase = step * Math.PI / 30;
    const along = a * Math.cos(phase), across = b * Math.sin(phase);
    return [along * Math.cos(turn) - across * Math.sin(turn), along * Math.sin(turn) + across * Math.cos(turn)];
  });
}

function drawEllipses(parent, states) {
  const cell = 76;
  const perRow = Math.min(states.length, 14);
  const rows = Math.ceil(states.length / perRow);
  const figure = parent.append("figure");
  const svg = picture(figure.append("div").attr("class", "wide"), perRow * cell, rows * (cell + 18), "The state behind each station",
    states.map((d) => `${d.words}: ${d.told}`).join("; "));
  svg.style("min-width", Math.min(perRow * cell, 640) + "px").style("max-width", perRow * cell + "px");
  const cells = svg.selectAll("g.cell").data(states).enter().append("g").attr("class", "cell").attr("role", "button")
    .attr("tabindex", (d) => d.number === null ? null : 0).attr("aria-label", (d) => `${d.words}: ${d.told}`)
    .attr("transform", (d, i) => `translate(${(i % perRow) * cell + cell / 2} ${Math.floor(i / perRow) * (cell + 18) + cell / 2})`);
  cells.append("title").text((d) => `${d.words}: ${d.told}`);
  cells.append("rect").attr("class", "ellipse-frame").attr("x", -cell / 2 + 3).attr("y", -cell / 2 + 3).attr("width", cell - 6)
    .attr("height", cell - 6).attr("rx", 4);
  cells.append("text").attr("text-anchor", "middle").attr("y", cell / 2 + 12).text((d) => d.number === null ? "launched" : d.number);
  cells.filter((d) => d.ellipticity !== null && d.dop > 1e-6).each(function (d) {
    const points = ellipsePoints(d.azimuth || 0, d.ellipticity, 28 * d.dop);
    const line = points.map((point) => `${point[0].toFixed(2)} ${(-point[1]).toFixed(2)}`);
    d3.select(this).append("path").attr("class", "ellipse").attr("d", "M" + line.join("L"));
    if (Math.abs(d.ellipticity) > 0.5) arrowHead(d3.select(this), points);
  });
  const choosable = cells.filter((d) => d.number !== null);
  pointsAt(choosable, "station", (d) => d.number);
  const update = () => {
    mark(choosable, "station", (d) => d.number);
    choosable.attr("aria-pressed", (d) => String(state.station === d.number));
  };
  update();
  watch(update);
  figure.append("figcaption").text("The ellipse that the field draws at a fixed place, seen facing the source, x to the right and y up: " +
    "anticlockwise is right-handed (IEEE). Its size is the degree of polarization.");
}

function arrowHead(parent, points) {
  const tip = points[4], before = points[2];
  const angle = Math.atan2(-(tip[1] - before[1]), tip[0] - before[0]) * 180 / Math.PI;
  parent.append("path").attr("class", "arrow").attr("d", "M5 0L-4 -4L-4 4Z")
    .attr("transform", `translate(${tip[0].toFixed(2)} ${(-tip[1]).toFixed(2)}) rotate(${angle.toFixed(1)})`);
}

/** The launched state, then one behind each station. */
function chiefStates() {
  const chief = polarization.chief;
  if (!chief) return [];
  const states = chief.stations.map((station) => {
    const s0 = station.stokes[0];
    return {
      number: stationNumber(station.name), words: station.name,
      point: s0 > 0 ? station.stokes.slice(1).map((value) => value / s0) : [0, 0, 0],
      dop: station.dop || 0, azimuth: station.azimuth_deg, ellipticity: station.ellipticity_deg
    };
  });
  const launched = data.pictures.launched;
  if (launched) states.unshift({number: null, words: "launched", point: launched.stokes.slice(1), dop: launched.dop,
    azimuth: launched.azimuth_deg, ellipticity: launched.ellipticity_deg});
  states.forEach((d) => {
    if (d.number !== null) d.words = stationName(d.number);
    d.told = d.ellipticity === null ? "unpolarized" : [d.azimuth === null ? "no azimuth" : `azimuth ${quantity(d.azimuth)} deg`,
      `ellipticity ${quantity(d.ellipticity)} deg`, handedness(d.ellipticity)].join(", ");
  });
  return states;
}

function drawAttribution(parent) {
  const rows = polarization.attribution.map((row) => ({row, number: stationNumber(row.name)}));
  attributionKinds.forEach((kind) => {
    const size = (d) => Math.abs(d.row[kind.key] || 0);
    const most = d3.max(rows, size);
    const values = rows.filter((d) => matters(d.row, kind) && size(d) > 0.002 * most).sort((one, other) => size(other) - size(one));
    if (values.length) drawBars(parent.append("div"), kind, values.slice(0, 12), rows.length);
  });
}

function drawBars(parent, kind, values, all) {
  const width = 440, line = 22, left = 160, right = 76;
  const height = values.length * line + 10;
  parent.append("h3").text("Who changes " + kind.heading);
  const most = d3.max(values, (d) => Math.abs(d.row[kind.key]));
  const low = d3.min(values, (d) => d.row[kind.key]) < 0 ? -most : 0;
  const x = d3.scaleLinear().domain([low, most]).range([left, width - right]);
  const svg = picture(parent, width, height, "Attribution of " + kind.heading,
    values.map((d) => `${d.row.name} ${quantity(d.row[kind.key])}`).join("; "));
  svg.style("max-width", width + "px");
  const bars = svg.selectAll("g").data(values).enter().append("g").attr("class", "cell").attr("transform", (d, i) => `translate(0 ${i * line + 4})`)
    .attr("tabindex", 0).attr("role", "button").attr("aria-label", (d) => `${d.row.name}: ${quantity(d.row[kind.key])}`);
  bars.append("text").attr("x", left - 8).attr("y", 14).attr("text-anchor", "end")
    .text((d) => { const words = d.number === null ? d.row.name : stationName(d.number); return words.length > 24 ? words.slice(0, 22) + "…" : words; });
  bars.append("rect").attr("class", (d) => "bar" + (d.row[kind.key] < 0 ? " negative" : "")).attr("y", 3).attr("height", line - 7)
    .attr("x", (d) => Math.min(x(0), x(d.row[kind.key]))).attr("width", (d) => Math.max(0.5, Math.abs(x(d.row[kind.key]) - x(0))));
  bars.append("text").attr("y", 14).attr("x", (d) => Math.max(x(0), x(d.row[kind.key])) + 5).text((d) => quantity(d.row[kind.key]));
  if (values.length < all)
    parent.append("p").attr("class", "note").text(`${counted(all - values.length, "other station")} below ${quantity(0.002 * most)} or not among the first twelve.`);
  svg.append("line").attr("class", "zero").attr("x1", x(0)).attr("x2", x(0)).attr("y1", 2).attr("y2", height - 4);
  const stationBars = bars.filter((d) => d.number !== null);
  pointsAt(stationBars, "station", (d) => d.number);
  watch(() => mark(stationBars, "station", (d) => d.number));
}

function drawMueller(parent) {
  const rows = polarization.detector.mueller;
  if (!rows) return;
  const details = parent.append("details");
  details.append("summary").text("Mueller matrix from the entrance to the detector");
  const body = details.append("div").attr("class", "wide").append("table").append("tbody");
  body.selectAll("tr").data(rows).enter().append("tr").selectAll("td").data((d) => d).enter().append("td")
    .attr("title", fullPrecision).text((d) => (d < 0 ? "" : " ") + d.toFixed(6));
}

function drawMaps(parent) {
  const maps = data.pictures.maps || [];
  if (!maps.length) return;
  parent.append("h3").text("Across the pupil");
  const list = parent.append("div").attr("class", "maps");
  maps.forEach((map) => {
    const figure = list.append("figure");
    figure.append("img").attr("src", map.png).attr("alt", map.words).attr("loading", "lazy");
    figure.append("figcaption").text(map.words);
  });
}

function drawPolarization() {
  const parent = d3.select("#polarization-body");
  if (!polarization) {
    parent.append("p").text("Polarization was not traced for this page.");
    return;
  }
  const worst = worstOffender();
  parent.append("p").text(worst ? `Of the stations, ${worst.name} changes ${worst.kind.heading.replace(", deg", "")} most.` : "No station changes the state of polarization.");
  tellPolarization(parent);
  const states = chiefStates();
  const polarized = states.some((state_) => state_.dop > leastPolarized);
  if (polarized) drawEllipses(parent, states);
  else if (states.length) parent.append("p").attr("id", "unpolarized").text("The light is unpolarized and stays so but for " +
    `${perCent(d3.max(states, (d) => d.dop))}, so there is no ellipse to draw; the table has the states.`);
  else parent.append("p").text("There is no chief ray whose state could be followed: it misses a surface, or is totally reflected at a lens.");
  const pair = parent.append("div").attr("class", "side-by-side");
  if (polarized) drawSphere(pair.append("div"), states);
  drawAttribution(pair);
  if (states.length) foldedTable(parent, "The chief ray's state as a table", [
    {heading: "no.", cell: (d) => d.number === null ? "" : d.number}, {heading: "behind", text: true, cell: (d) => d.words},
    {heading: "DoP", cell: (d) => quantity(d.dop)}, {heading: "azimuth, deg", cell: (d) => quantity(d.azimuth)},
    {heading: "ellipticity, deg", cell: (d) => quantity(d.ellipticity)}, {heading: "handedness", text: true, cell: (d) => d.ellipticity === null ? "" : handedness(d.ellipticity)}], states);
  foldedTable(parent, "Attribution as a table", [{heading: "station", text: true, cell: (d) => d.name}]
    .concat(attributionKinds.map((kind) => ({heading: kind.heading, cell: (d) => quantity(d[kind.key]), title: (d) => fullPrecision(d[kind.key])}))), polarization.attribution);
  drawMueller(parent);
  drawMaps(parent);
}
