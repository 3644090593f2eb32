// The stream of power on the stations' numbers: losses leave it downward, each as wide as its share.

const lossMarks = {
  aside: "", absorbed: "M0 8L8 0", clipped: "M0 0L8 8", missed: "M2 2h2v2h-2z", scattered: "M0 4h8",
  extra: "M4 0v8", bulk: "M0 8L8 0M0 0L8 8"
};

/** A colour and a pattern for each loss, so that print and colour-blind readers tell them apart. */
function definePatterns(svg) {
  const defs = svg.append("defs");
  losses.forEach((loss) => {
    const pattern = defs.append("pattern").attr("id", "loss-" + loss).attr("width", 8).attr("height", 8)
      .attr("patternUnits", "userSpaceOnUse");
    pattern.append("rect").attr("width", 8).attr("height", 8).attr("style", `fill:var(--${loss})`);
    pattern.append("path").attr("d", lossMarks[loss]).attr("style", "stroke:#111;stroke-opacity:.55;fill:none");
  });
}

function drawLossKey() {
  const shown = losses.filter((loss) => stations.some((station) => station[loss] !== 0));
  const items = d3.select("#loss-key").selectAll("span").data(shown).enter().append("span");
  const swatch = items.append("svg").attr("width", 22).attr("height", 14).attr("aria-hidden", "true");
  swatch.append("rect").attr("width", 22).attr("height", 14).attr("class", "loss-edge").attr("fill", (d) => `url(#loss-${d})`);
  items.append("span").text((d) => d);
}

const streamSize = {left: 34, right: 120, top: 132, drop: 34, turn: 5, between: 3, leastStep: 36};

/** Widths that fit: px of stream for all power, and px between stations. */
function streamScale(rows) {
  const width = Math.max(1080, streamSize.left + streamSize.right + rows.length * streamSize.leastStep);
  const step = (width - streamSize.left - streamSize.right) / rows.length;
  let scale = 170;
  rows.forEach((row) => {
    const kinds = losses.filter((loss) => row[loss] > 0);
    const sum = d3.sum(kinds, (loss) => row[loss]);
    if (sum > 0)
      scale = Math.min(scale, Math.max(30, (0.86 * step - streamSize.turn - streamSize.between * kinds.length) / sum));
  });
  return {width, step, scale};
}

/** The outline of the stream and of all that leaves it. */
function streamShapes(rows, size) {
  const top = streamSize.top;
  const edge = [];
  const ribbons = [];
  const x = (index) => streamSize.left + (index + 0.12) * size.step;
  const floor = top + size.scale + streamSize.drop;
  let y = top + size.scale * (rows.length ? rows[0].incident : 0);
  edge.push([streamSize.left - 24, y]);
  rows.forEach((row, index) => {
    let at = x(index);
    losses.filter((loss) => row[loss] > 0).forEach((loss) => {
      const width = size.scale * row[loss];
      edge.push([at, y], [at, y - width]);
      ribbons.push({number: index + 1, loss, power: row[loss], at, y, width: Math.max(width, 0.8), floor});
      at += width + streamSize.between;
      y -= width;
    });
  });
  edge.push([size.width - streamSize.right + 8, y]);
  return {edge, ribbons, top, floor, x};
}

/** A ribbon that runs with the stream, then turns down. */
function ribbonPath(ribbon) {
  const turn = streamSize.turn;
  const {at, y, width, floor} = ribbon;
  const outer = turn + width;
  return `M${at} ${y - width}A${outer} ${outer} 0 0 1 ${at + outer} ${y + turn}V${floor}L${at + turn + width / 2} ${floor + Math.min(6, width)}` +
    `L${at + turn} ${floor}V${y + turn}A${turn} ${turn} 0 0 0 ${at} ${y}Z`;
}

/** Shares below the ribbons, in as many lines as it takes to keep them apart. */
function placeShares(ribbons) {
  const ends = [];
  return ribbons.filter((ribbon) => ribbon.power >= 0.001).map((ribbon) => {
    const words = perCent(ribbon.power);
    const middle = ribbon.at + streamSize.turn + ribbon.width / 2;
    const half = 3.6 * words.length;
    let line = ends.findIndex((end) => end < middle - half - 3);
    if (line < 0) line = ends.length;
    ends[line] = middle + half;
    return {ribbon, words, middle, line};
  });
}

function drawStreamStations(svg, rows, size, shapes, bottom) {
  const groups = svg.append("g").attr("role", "listbox").attr("aria-label", "Stations in the order of the light")
    .selectAll("g").data(rows.map((row, index) => ({row, number: index + 1}))).enter().append("g")
    .attr("class", "stream-station").attr("role", "option").attr("data-station", (d) => d.number)
    .attr("aria-label", (d) => stationWords(d.row, d.number));
  groups.append("rect").attr("class", "station-target").attr("x", (d) => streamSize.left + (d.number - 1) * size.step)
    .attr("y", streamSize.top - 6).attr("width", size.step).attr("height", bottom - streamSize.top + 6);
  groups.append("line").attr("class", "station-mark").attr("y1", streamSize.top)
    .attr("x1", (d) => shapes.x(d.number - 1)).attr("x2", (d) => shapes.x(d.number - 1))
    .attr("y2", (d) => streamSize.top + size.scale * d.row.incident);
  const labels = groups.append("text")
    .attr("transform", (d) => `translate(${shapes.x(d.number - 1) + 4} ${streamSize.top - 12}) rotate(-48)`);
  labels.append("tspan").attr("font-weight", 600).text((d) => d.number);
  labels.append("tspan").attr("dx", 4).text((d) => d.row.name.length > 23 ? d.row.name.slice(0, 21) + "…" : d.row.name);
  pointsAt(groups, "station", (d) => d.number);
  return groups;
}

function drawStream() {
  const parent = d3.select("#stream");
  let groups = null;
  const update = () => {
    mark(groups, "station", (d) => d.number);
    groups.attr("aria-selected", (d) => String(state.station === d.number))
      .attr("tabindex", (d) => (state.station || 1) === d.number ? 0 : -1);
  };
  const redraw = () => {
    const rows = chosenStations();
    const size = streamScale(rows);
    const shapes = streamShapes(rows, size);
    const shares = placeShares(shapes.ribbons);
    const bottom = shapes.floor + 22 + 14 * (1 + (d3.max(shares, (d) => d.line) || 0));
    const focused = document.activeElement && document.activeElement.closest("#stream");
    parent.selectAll("svg").remove();
    const svg = picture(parent, size.width, bottom, `Where the power goes, ${chosenLightWords()}`,
      "A stream from left to right whose width is the power; at each station its losses leave downward.");
    svg.style("min-width", Math.min(size.width, Math.max(640, rows.length * 30)) + "px");
    definePatterns(svg);
    const band = shapes.edge.map((point) => point.join(" ")).join("L");
    svg.append("path").attr("class", "band").attr("d", `M${streamSize.left - 24} ${shapes.top}L${band}V${shapes.top}Z`);
    svg.append("g").selectAll("path").data(shapes.ribbons).enter().append("path").attr("class", "loss-edge")
      .attr("fill", (d) => `url(#loss-${d.loss})`).attr("d", ribbonPath);
    svg.append("g").selectAll("text").data(shares).enter().append("text").attr("text-anchor", "middle")
      .attr("x", (d) => d.middle).attr("y", (d) => shapes.floor + 20 + 14 * d.line).text((d) => d.words);
    const delivered = rows.length ? rows[rows.length - 1].onward : 0;
    const end = svg.append("text").attr("x", size.width - streamSize.right + 16).attr("font-weight", 600)
      .attr("y", shapes.top + Math.max(0.5 * size.scale * delivered, 8));
    end.append("tspan").text(perCent(delivered));
    end.append("tspan").attr("x", size.width - streamSize.right + 16).attr("dy", 16).text("delivered");
    groups = drawStreamStations(svg, rows, size, shapes, bottom);
    update();
    if (focused) groups.filter((d) => d.number === state.station).each(function () { this.focus(); });
  };
  redraw();
  watch((change) => {
    if ("wavelength" in change || "field" in change || "unit" in change) redraw();
    else update();
  });
  parent.on("keydown", () => {
    const step = {ArrowRight: 1, ArrowLeft: -1}[d3.event.key];
    if (!step) return;
    d3.event.preventDefault();
    d3.event.stopPropagation();
    const number = stepStation(step);
    groups.filter((d) => d.number === number).each(function () { this.focus(); });
  });
}
