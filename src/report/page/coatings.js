// What do the coatings do? Small multiples: R and T against wavelength at the angles that really occur.

function angleWords(angles) {
  if (angles.length === 1) return [`${plain(angles[0])}°`];
  if (angles.length === 2) return [`least ${plain(angles[0])}°`, `greatest ${plain(angles[1])}°`];
  return [`least ${plain(angles[0])}°`, `mean ${plain(angles[1])}°`, `greatest ${plain(angles[2])}°`];
}

/** One curve for each angle and polarization. */
function coatingCurves(coating, kind) {
  const rows = coating.coating.rows;
  const angles = Array.from(new Set(rows.map((row) => row.angle_deg))).sort(d3.ascending);
  const curves = [];
  angles.forEach((angle, index) => ["s", "p"].forEach((component) => {
    const points = rows.filter((row) => row.angle_deg === angle).map((row) => [row.wavelength_nm, row[kind + component]]);
    const alike = component === "p" && points.every((point, i) => Math.abs(point[1] - curves[curves.length - 1].points[i][1]) < 1e-9);
    if (!alike) curves.push({angle, index, component, points});
  }));
  return {angles, curves};
}

function drawCoatingPlot(parent, coating, kind, words) {
  const {angles, curves} = coatingCurves(coating, kind);
  const width = 360, height = 230, left = 54, right = 12, top = 22, bottom = 40;
  const points = [].concat(...curves.map((curve) => curve.points));
  const x = d3.scaleLinear().domain(d3.extent(points, (d) => d[0])).range([left, width - right]);
  const extent = d3.extent(points, (d) => 100 * d[1]);
  const room = 0.08 * (extent[1] - extent[0]) || 0.5;
  const y = d3.scaleLinear().domain([Math.max(0, extent[0] - room), extent[1] + room]).nice(5).range([height - bottom, top]);
  y.domain([y.domain()[0], Math.min(100, y.domain()[1])]);
  const svg = picture(parent, width, height, `${coating.coating.name}: ${words}`,
    curves.map((curve) => `${curve.component} at ${plain(curve.angle)} degrees from ${perCent(d3.min(curve.points, (d) => d[1]))} to ${perCent(d3.max(curve.points, (d) => d[1]))}`).join("; "));
  svg.append("g").selectAll("line").data(y.ticks(5)).enter().append("line").attr("class", "gridline").attr("x1", left).attr("x2", width - right)
    .attr("y1", (d) => y(d)).attr("y2", (d) => y(d));
  svg.append("g").attr("class", "axis").attr("transform", `translate(0 ${height - bottom})`).call(d3.axisBottom(x).ticks(5).tickFormat(plain));
  svg.append("g").attr("class", "axis").attr("transform", `translate(${left} 0)`).call(d3.axisLeft(y).ticks(5).tickFormat(plain));
  svg.append("text").attr("x", left).attr("y", 13).attr("font-weight", 600).text(words + ", %");
  svg.append("text").attr("x", (left + width - right) / 2).attr("y", height - 6).attr("text-anchor", "middle").text("wavelength, nm");
  svg.append("g").selectAll("line").data(data.pictures.wavelengths.filter((nm) => nm >= x.domain()[0] && nm <= x.domain()[1])).enter().append("line")
    .attr("class", "wavelength-mark").attr("x1", (d) => x(d)).attr("x2", (d) => x(d)).attr("y1", top).attr("y2", height - bottom);
  const line = d3.line().x((d) => x(d[0])).y((d) => y(100 * d[1]));
  svg.append("g").selectAll("path").data(curves).enter().append("path")
    .attr("class", (d) => `curve a${angles.length === 1 ? 0 : d.index} ${d.component}`).attr("d", (d) => line(d.points));
  readOut(svg, {x, left, right, top, bottom, width, height}, curves, parent.append("p").attr("class", "figures coating-figures"), words);
}

/** A line under the mouse or the arrow keys, and the figures there. */
function readOut(svg, frame, curves, told, words) {
  const grid = curves[0].points.map((point) => point[0]);
  const cursor = svg.append("line").attr("class", "cursor").attr("y1", frame.top).attr("y2", frame.height - frame.bottom).style("display", "none");
  let at = null;
  const tell = (index) => {
    at = Math.max(0, Math.min(grid.length - 1, index));
    cursor.style("display", null).attr("x1", frame.x(grid[at])).attr("x2", frame.x(grid[at]));
    told.text(`${plain(grid[at])} nm, ${words}: ` + curves.map((curve) => `${curve.component} at ${plain(curve.angle)}° ${perCent(curve.points[at][1])}`).join(", "));
  };
  svg.append("rect").attr("x", frame.left).attr("y", frame.top).attr("width", frame.width - frame.left - frame.right)
    .attr("height", frame.height - frame.top - frame.bottom).attr("fill", "transparent")
    .on("mousemove", function () { tell(d3.bisectCenter ? d3.bisectCenter(grid, frame.x.invert(d3.mouse(this)[0])) : nearest(grid, frame.x.invert(d3.mouse(this)[0]))); })
    .on("mouseleave", () => { cursor.style("display", "none"); });
  svg.attr("tabindex", 0).on("keydown", () => {
    const step = {ArrowRight: 1, ArrowLeft: -1}[d3.event.key];
    if (!step) return;
    d3.event.preventDefault();
    d3.event.stopPropagation();
    tell(at === null ? Math.floor(grid.length / 2) : at + step);
  });
}

function nearest(grid, value) {
  return d3.scan(grid, (one, other) => Math.abs(one - value) - Math.abs(other - value));
}

function drawCoatings() {
  const parent = d3.select("#coating-body");
  if (!data.coatings.length) {
    parent.append("p").text("No station has a coating.");
    return;
  }
  parent.append("p").text("Against the wavelength, at the angles of incidence that really occur, as they are in the medium outside the coating. " +
    "Full lines are s, dashed ones p; one line where both agree. Dotted verticals mark the light's wavelengths.");
  const list = parent.append("div").attr("class", "multiples");
  data.coatings.forEach((entry) => {
    const coating = entry.document;
    const figure = list.append("figure").attr("data-coating", coating.coating.name);
    figure.append("h3").text(`${coating.coating.name}: ${coating.coating.incident} on ${coating.coating.substrate}`);
    const angles = Array.from(new Set(coating.coating.rows.map((row) => row.angle_deg))).sort(d3.ascending);
    const key = figure.append("div").attr("class", "key");
    angleWords(angles).forEach((words, index) => {
      const item = key.append("span");
      item.append("svg").attr("width", 22).attr("height", 8).attr("aria-hidden", "true").append("path").attr("class", `curve a${index}`).attr("d", "M0 4h22");
      item.append("span").text(words);
    });
    drawCoatingPlot(figure, coating, "R", "reflectance");
    drawCoatingPlot(figure, coating, "T", "transmittance");
    figure.append("figcaption").text("At " + (entry.stations.length > 1 ? "stations " : "station ") + entry.stations.map(stationName).join(", ") + ".");
    foldedTable(figure, coating.coating.name + " as a table", [
      {heading: "wavelength, nm", cell: (d) => plain(d.wavelength_nm)}, {heading: "angle, deg", cell: (d) => plain(d.angle_deg)}]
      .concat(["Rs", "Rp", "Ts", "Tp", "As", "Ap"].map((key_) => ({heading: key_, cell: (d) => fraction(d[key_]), title: (d) => fullPrecision(d[key_])}))), coating.coating.rows);
  });
}
