// Which ghosts matter? Bright and small is the bad corner.

function bounceWords(path) {
  return path.bounces.map((name) => {
    const number = stationNumber(name);
    return number === null ? name : stationName(number);
  }).join(", then ");
}

function bounceNumbers(path) {
  return path.bounces.map((name) => stationNumber(name) || name).join(" → ");
}

/** Small powers relative to the delivered light: `3.2e-5`. */
function relativeWords(value) {
  if (value === null || value === undefined) return dash;
  if (value === 0) return "0";
  return value >= 0.01 ? value.toPrecision(3) : value.toExponential(2);
}

/** The requirement on the brightest ghost, if there is one. */
function ghostLimit() {
  const verdict = verdicts.find((entry) => /^ghosts\.(brightest|paths\[0\]\.relative_power)$/.test(entry.quantity) && entry.sense === "at_most");
  return verdict ? verdict.limit : null;
}

function tellGhosts(parent) {
  const sentences = [`${counted(ghosts.paths_considered, "path")} of up to ${ghosts.bounces} bounces can end at the detector; ` +
    `${ghosts.paths_traced} bring light. Together they bring ${relativeWords(ghosts.total)} of the launched power` +
    (ghosts.uncertainty === null ? "" : ` (± ${errorSize(ghosts.uncertainty)})`) +
    `, ${relativeWords(ghosts.total / budget.delivered)} of what is delivered.`,
  culpritWords(), `${perCent(ghosts.returned)} returns through the first station.`].filter((words) => words);
  parent.append("p").text(sentences.join(" "));
  parent.append("p").attr("id", "not-followed").text(
    `Not followed: ${relativeWords(ghosts.not_followed)} of the launched power. No path that was left out can bring more than that.`);
}

const ghostFilter = {words: "", least: 0};

function passesFilter(path) {
  const words = ghostFilter.words.trim().toLowerCase();
  const names = path.bounces.map((name) => (stationNumber(name) || "") + " " + name.toLowerCase()).join(" | ");
  return (!words || names.indexOf(words) >= 0) && (path.relative_power || 0) >= ghostFilter.least;
}

/** Radii below this share of the largest are drawn as that: below a few nanometres a spot is a point. */
const leastShareOfRadius = 1e-5;

function ghostPoints() {
  const most = d3.max(ghostPaths, (path) => path.rms_radius_mm || 0) || 1;
  return ghostPaths.map((path, index) => ({path, number: index + 1, radius: Math.max(path.rms_radius_mm || 0, leastShareOfRadius * most)}))
    .filter((point) => point.path.relative_power > 0);
}

function decadeDomain(values) {
  const low = Math.floor(Math.log10(d3.min(values)) + 1e-9);
  const high = Math.ceil(Math.log10(d3.max(values)) - 1e-9);
  return [Math.pow(10, low), Math.pow(10, Math.max(high, low + 1))];
}

function decadeAxis(axis, scale) {
  const [low, high] = scale.domain().map((value) => Math.round(Math.log10(value)));
  const stride = Math.max(1, Math.ceil((high - low) / 8));
  const ticks = d3.range(low, high + 1, stride).map((exponent) => Math.pow(10, exponent));
  return axis(scale).tickValues(ticks).tickFormat((value) => value >= 0.001 && value <= 10000 ? plain(value) : value.toExponential(0).replace("e+", "e"));
}

function drawGhostPlot(parent) {
  const points = ghostPoints();
  const width = 560, height = 400, left = 70, right = 18, top = 26, bottom = 52;
  const limit = ghostLimit();
  const figure = parent.append("figure");
  const svg = picture(figure, width, height, "Ghosts: relative power against rms radius",
    "Each point is a ghost. The higher it stands the brighter it is, the further left the smaller its spot.");
  const x = d3.scaleLog().domain(decadeDomain(points.map((d) => d.radius))).range([left, width - right]);
  const powers = points.map((d) => d.path.relative_power).concat(limit > 0 ? [limit] : []);
  const y = d3.scaleLog().domain(decadeDomain(powers)).range([height - bottom, top]);
  svg.append("g").attr("class", "axis").attr("transform", `translate(0 ${height - bottom})`).call(decadeAxis(d3.axisBottom, x));
  svg.append("g").attr("class", "axis").attr("transform", `translate(${left} 0)`).call(decadeAxis(d3.axisLeft, y));
  svg.append("text").attr("x", (left + width - right) / 2).attr("y", height - 12).attr("text-anchor", "middle").text("rms radius on the detector, mm");
  svg.append("text").attr("transform", `translate(16 ${(top + height - bottom) / 2}) rotate(-90)`).attr("text-anchor", "middle")
    .text("power, relative to delivered");
  svg.append("text").attr("class", "quiet").attr("x", left + 6).attr("y", top + 2).text("bright and small");
  if (limit > 0) {
    svg.append("line").attr("class", "limit").attr("x1", left).attr("x2", width - right).attr("y1", y(limit)).attr("y2", y(limit));
    svg.append("text").attr("class", "limit-words").attr("x", width - right).attr("y", y(limit) - 5).attr("text-anchor", "end")
      .text("required: at most " + relativeWords(limit));
  }
  const dots = svg.append("g").attr("role", "listbox").attr("aria-label", "Ghosts, brightest first").selectAll("circle")
    .data(points.slice().reverse()).enter().append("circle").attr("class", "dot").attr("role", "option")
    .attr("r", 5).attr("cx", (d) => x(d.radius)).attr("cy", (d) => y(d.path.relative_power))
    .attr("data-ghost", (d) => d.number)
    .attr("aria-label", (d) => `Ghost ${d.number}: ${bounceWords(d.path)}; relative power ${relativeWords(d.path.relative_power)}, ` +
      `rms radius ${quantity(d.path.rms_radius_mm)} mm`);
  dots.append("title").text((d) => `${d.number}: ${bounceWords(d.path)}`);
  pointsAt(dots, "ghost", (d) => d.number);
  const update = () => {
    mark(dots, "ghost", (d) => d.number);
    dots.classed("filtered", (d) => !passesFilter(d.path)).attr("aria-selected", (d) => String(state.ghost === d.number))
      .attr("r", (d) => state.ghost === d.number ? 8 : 5).attr("tabindex", (d) => (state.ghost || points[0].number) === d.number ? 0 : -1);
  };
  update();
  watch(update);
  figure.append("figcaption").text("Bright and small ghosts, in the upper left, do harm; large ones only lift the background.");
  stepsGhosts(d3.select(svg.node()), (number) => dots.filter((d) => d.number === number));
}

/** Up and down keys go from ghost to ghost in the order that is shown. */
let ghostOrder = ghostPaths.map((path, index) => index + 1);

function stepsGhosts(selection, elementOf) {
  selection.on("keydown.ghosts", () => {
    const step = {ArrowDown: 1, ArrowUp: -1, ArrowRight: 1, ArrowLeft: -1}[d3.event.key];
    if (!step || !ghostOrder.length) return;
    d3.event.preventDefault();
    d3.event.stopPropagation();
    const at = ghostOrder.indexOf(state.ghost);
    const next = ghostOrder[Math.min(Math.max(at + step, 0), ghostOrder.length - 1)];
    choose({ghost: next});
    elementOf(next).each(function () { this.focus(); });
  });
}

/** The mean reflectance of a refracting station for the light that arrives there. */
function reflectanceAt(name) {
  const number = stationNumber(name);
  if (number === null) return null;
  const row = stations[number - 1];
  const arrives = row.incident - row.missed - row.clipped;
  return row.does === "refract" && arrives > 0 ? row.aside / arrives : null;
}

/** Each bounce with its reflectance, as this path meets it where that is known. */
function bouncesOf(path) {
  return path.bounces.map((name, index) => ({
    words: stationNumber(name) === null ? name : stationName(stationNumber(name)),
    now: path.reflectances ? path.reflectances[index] : reflectanceAt(name),
    needed: path.needed_reflectances ? path.needed_reflectances[index] : null
  })).filter((bounce) => bounce.now !== null && bounce.now !== undefined);
}

/** What would cure a ghost: its power goes as the product of the reflectances it bounces from. */
function cureWords(path) {
  const bounces = bouncesOf(path);
  if (!bounces.length) return "";
  const known = bounces.filter((bounce) => bounce.needed !== null);
  if (known.length) return "Any one of these alone keeps the limit on ghosts: " +
    known.map((bounce) => `${bounce.words} from R = ${quantity(bounce.now)} to at most ${quantity(bounce.needed)}`).join("; ") + ".";
  const limit = ghostLimit();
  if (limit !== null && path.relative_power <= limit) return "It is within the requirement.";
  const factor = limit !== null ? path.relative_power / limit : 10;
  return (limit !== null ? "To meet the requirement, bring " : "To make it ten times fainter, bring ") +
    bounces.map((bounce) => `${bounce.words} from R = ${quantity(bounce.now)} to at most ${quantity(bounce.now / factor)}`).join(", or ") +
    (bounces.length > 1 ? `; or both down by a factor ${quantity(Math.sqrt(factor))}.` : ".");
}

/** The surface that has its hand in most of the ghosts' light. */
function culpritWords() {
  const culprit = ghosts.culprit;
  if (!culprit) return "";
  const number = stationNumber(culprit.name);
  return `${number === null ? culprit.name : stationName(number)} takes part in ${perCent(culprit.power / ghosts.total)} of it` +
    (culprit.reflectance === null ? "." : `, reflecting ${perCent(culprit.reflectance)}.`) +
    (culprit.needed_reflectance === null || culprit.needed_reflectance === undefined ? ""
      : ` At most ${perCent(culprit.needed_reflectance)} there would keep the limit.`);
}

/** Places where light draws together inside the train. */
function drawFoci(parent) {
  const foci = ghosts.foci || [];
  if (!foci.length) return;
  const name = (words) => stationNumber(words) === null ? words : stationName(stationNumber(words));
  const details = parent.append("details").attr("id", "foci");
  details.append("summary").text(`Where light draws together: ${counted(foci.length, "place")}`);
  details.append("p").attr("class", "caution").text("Geometrical estimates for comparison. Whether a place is harmed, or harms, is for a laser safety officer and IEC 60825-1 to say.");
  table(details.append("div").attr("class", "wide"), "Brightest first; irradiance relative to that of the launched beam", [
    {heading: "between", text: true, cell: (d) => `${name(d.from)} and ${name(d.to)}`},
    {heading: "on or in", text: true, cell: (d) => d.on !== null ? name(d.on) : d.medium},
    {heading: "behind, mm", cell: (d) => quantity(d.distance_mm)},
    {heading: "by", text: true, cell: (d) => d.bounces.length ? "bounces at " + d.bounces.map(name).join(", ") : "the intended beam"},
    {heading: "power", cell: (d) => relativeWords(d.power)}, {heading: "radius, mm", cell: (d) => quantity(d.radius_mm)},
    {heading: "irradiance", cell: (d) => relativeWords(d.irradiance_ratio)}], foci);
}

function drawSpot(parent, number) {
  const sensor = data.pictures.sensor;
  const path = ghostPaths[number - 1];
  const picturesOfGhost = data.pictures.ghosts[number - 1];
  if (!sensor || !path.centroid_mm) return;
  const ghost = picturesOfGhost ? picturesOfGhost.spot : [];
  const image = data.pictures.image;
  const reach = 1.08 * Math.max(sensor.half_x, sensor.half_y);
  const size = 300;
  const x = d3.scaleLinear().domain([-reach, reach]).range([4, size - 4]);
  const y = d3.scaleLinear().domain([-reach, reach]).range([size - 4, 4]);
  const figure = parent.append("figure");
  const svg = picture(figure, size, size, `The spot of ghost ${number} on the detector`,
    `Centre at x ${quantity(path.centroid_mm[0])}, y ${quantity(path.centroid_mm[1])} mm, rms radius ${quantity(path.rms_radius_mm)} mm.`);
  svg.style("max-width", size + "px");
  const edge = sensor.round ? svg.append("ellipse").attr("cx", x(0)).attr("cy", y(0)).attr("rx", x(sensor.half_x) - x(0)).attr("ry", y(0) - y(sensor.half_y))
    : svg.append("rect").attr("x", x(-sensor.half_x)).attr("y", y(sensor.half_y)).attr("width", x(sensor.half_x) - x(-sensor.half_x))
      .attr("height", y(-sensor.half_y) - y(sensor.half_y));
  edge.attr("class", "sensor-edge");
  const inside = (d) => Math.abs(d[0]) <= reach && Math.abs(d[1]) <= reach;
  const dots = (points, kind, radius) => svg.append("g").selectAll("circle").data(points.filter(inside)).enter().append("circle")
    .attr("class", kind).attr("r", radius).attr("cx", (d) => x(d[0])).attr("cy", (d) => y(d[1]));
  dots(image, "spot-image", 4.5);
  dots(ghost, "spot-ghost", 1.8);
  svg.append("circle").attr("class", "spot-ring").attr("cx", x(path.centroid_mm[0])).attr("cy", y(path.centroid_mm[1]))
    .attr("r", Math.max(2, x(path.rms_radius_mm) - x(0)));
  figure.append("figcaption").text("On the detector, x to the right and y up: the ghost's rays as small dots, a ring of its rms radius over all fields, and the images as large dots.");
}

function drawGhostDetail(parent) {
  const update = () => {
    const number = state.ghost;
    parent.selectAll("*").remove();
    if (number === null) {
      parent.append("p").text("Choose a ghost in the plot or in the table: its figures, its spot and its cure stand here, its rays in the drawing above.");
      return;
    }
    const path = ghostPaths[number - 1];
    parent.append("h3").text(`Ghost ${number}: ${bounceWords(path)}`);
    facts(parent, [
      ["power", `${relativeWords(path.power)} of launched` + (path.uncertainty ? ` ± ${errorSize(path.uncertainty)}` : "")],
      ["relative power", relativeWords(path.relative_power) + " of delivered"],
      ["brightest pixel", path.peak_ratio === null || path.peak_ratio === undefined ? "not known" : relativeWords(path.peak_ratio) + " of the image's"],
      ["rms radius", quantity(path.rms_radius_mm) + " mm"],
      ["path beyond the direct one", quantity(path.path_excess_mm) + " mm" + (path.path_excess_mm ? ` (${quantity(path.path_excess_mm / 0.299792458)} ps)` : "")],
      ["polarization", `degree ${quantity(path.dop)}`],
      ["fringes", path.fringe_modulation === null || path.fringe_modulation === undefined ? "none" : `modulation ${relativeWords(path.fringe_modulation)}, if the light is coherent`]
    ]);
    parent.append("p").attr("id", "cure").text(cureWords(path));
    drawSpot(parent, number);
  };
  update();
  watch((change) => { if ("ghost" in change) update(); });
}

/** The rays of the chosen ghost in the drawing of the train. */
function drawGhostRays() {
  const view = d3.select("#drawing .light");
  const update = () => {
    const pictures = state.ghost === null ? null : data.pictures.ghosts[state.ghost - 1];
    view.selectAll(".chosen-ghost").remove();
    d3.select("#drawing > svg").classed("with-ghost", !!pictures);
    if (pictures)
      view.selectAll(".chosen-ghost").data(pictures.rays).enter().append("path").attr("class", "chosen-ghost").attr("d", (d) => d);
  };
  update();
  watch((change) => { if ("ghost" in change) update(); });
}

const ghostColumns = [
  {key: "number", heading: "no.", value: (d) => d.number, words: (d) => d.number, first: 1},
  {key: "bounces", heading: "bounces", text: true, value: (d) => d.path.bounces.join(), words: (d) => bounceWords(d.path), first: 1},
  {key: "relative_power", heading: "relative power", value: (d) => d.path.relative_power, words: (d) => relativeWords(d.path.relative_power), first: -1},
  {key: "rms_radius_mm", heading: "rms radius, mm", value: (d) => d.path.rms_radius_mm, words: (d) => quantity(d.path.rms_radius_mm), first: 1},
  {key: "path_excess_mm", heading: "path excess, mm", value: (d) => d.path.path_excess_mm, words: (d) => quantity(d.path.path_excess_mm), first: -1},
  {key: "peak_ratio", heading: "peak ratio", value: (d) => d.path.peak_ratio, words: (d) => relativeWords(d.path.peak_ratio), first: -1},
  {key: "dop", heading: "DoP", value: (d) => d.path.dop, words: (d) => quantity(d.path.dop), first: -1}
];

function compare(one, other) {
  const none = (value) => value === null || value === undefined;
  if (none(one) || none(other)) return none(one) - none(other);
  return typeof one === "string" ? one.localeCompare(other) : one - other;
}

function drawGhostTable(parent) {
  const sort = {key: "number", direction: 1};
  const all = ghostPaths.map((path, index) => ({path, number: index + 1}));
  const controls = parent.append("div").attr("class", "controls");
  const search = controls.append("label").text("Bounces at").append("input").attr("id", "ghost-filter").attr("type", "search")
    .attr("placeholder", "station, by name or number");
  const least = control(controls, "At least", "ghost-least",
    [0, 1e-8, 1e-7, 1e-6, 1e-5, 1e-4, 1e-3].map((value) => ({value, words: value ? relativeWords(value) : "any power"})),
    (value) => { ghostFilter.least = Number(value); refill(); });
  search.on("input", function () { ghostFilter.words = this.value; refill(); });
  const count = controls.append("span").attr("role", "status").attr("id", "ghost-count");
  const made = parent.append("div").attr("class", "wide").attr("id", "ghost-list").append("table").attr("id", "ghost-table");
  made.append("caption").text("Ghosts, with their power relative to delivered");
  const headings = made.append("thead").append("tr").selectAll("th").data(ghostColumns).enter().append("th").attr("scope", "col")
    .classed("text", (d) => !!d.text);
  headings.append("button").attr("type", "button").text((d) => d.heading).on("click", (d) => {
    sort.direction = sort.key === d.key ? -sort.direction : d.first;
    sort.key = d.key;
    refill();
  });
  const body = made.append("tbody");
  const most = 200;
  function refill() {
    const column = ghostColumns.find((entry) => entry.key === sort.key);
    const rows = all.filter((d) => passesFilter(d.path)).sort((one, other) =>
      (column.value(one) === null || column.value(other) === null ? 1 : sort.direction) * compare(column.value(one), column.value(other)) || one.number - other.number);
    ghostOrder = rows.map((d) => d.number);
    const shown = rows.slice(0, most);
    count.text(`${rows.length} of ${counted(all.length, "ghost")}` + (data.pictures.left_out ? `; ${data.pictures.left_out} fainter ones are left to the command` : "") + (rows.length > most ? `, the first ${most} shown` : ""));
    headings.attr("aria-sort", (d) => d.key === sort.key ? (sort.direction > 0 ? "ascending" : "descending") : null);
    const lines = body.selectAll("tr").data(shown, (d) => d.number);
    lines.exit().remove();
    const entered = lines.enter().append("tr").attr("tabindex", 0).attr("data-ghost", (d) => d.number);
    ghostColumns.forEach((entry) => entered.append("td").classed("text", !!entry.text)
      .attr("title", (d) => entry.text ? null : fullPrecision(entry.value(d))).text(entry.words));
    pointsAt(entered, "ghost", (d) => d.number);
    entered.on("keydown.choose", (d) => {
      if (d3.event.key !== "Enter" && d3.event.key !== " ") return;
      d3.event.preventDefault();
      choose({ghost: state.ghost === d.number ? null : d.number});
    });
    lines.merge(entered).order();
    tellAll({filter: true});
  }
  refill();
  const update = () => {
    const lines = body.selectAll("tr");
    mark(lines, "ghost", (d) => d.number);
    lines.attr("aria-current", (d) => state.ghost === d.number ? "true" : null);
  };
  update();
  watch(update);
  stepsGhosts(body, (number) => body.selectAll("tr").filter((d) => d.number === number));
  least.property("value", ghostFilter.least);
}

function drawGhosts() {
  const parent = d3.select("#ghost-body");
  if (!ghosts) {
    parent.append("p").text("Ghosts were not traced for this page.");
    return;
  }
  tellGhosts(parent);
  if (!ghostPaths.length) {
    parent.append("p").text("No unintended reflection reaches the detector.");
    return;
  }
  const pair = parent.append("div").attr("class", "side-by-side");
  if (ghostPoints().length) drawGhostPlot(pair.append("div"));
  drawGhostDetail(pair.append("div").attr("id", "ghost-detail").attr("aria-live", "polite"));
  drawGhostTable(parent);
  drawFoci(parent);
  drawGhostRays();
}
