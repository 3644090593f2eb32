// The Poincaré sphere: a map of all states of polarization, that can be turned.

const sphere = {yaw: -35, pitch: 22, size: 360, radius: 128};

/** Where a point of the unit sphere stands in the picture; z is toward the reader. */
function onPaper(point) {
  const yaw = sphere.yaw * Math.PI / 180;
  const pitch = sphere.pitch * Math.PI / 180;
  const across = -Math.sin(yaw) * point[0] + Math.cos(yaw) * point[1];
  const depth = Math.cos(yaw) * point[0] + Math.sin(yaw) * point[1];
  const up = Math.cos(pitch) * point[2] - Math.sin(pitch) * depth;
  const middle = sphere.size / 2;
  return {x: middle + sphere.radius * across, y: middle - sphere.radius * up, z: Math.sin(pitch) * point[2] + Math.cos(pitch) * depth};
}

function circleOfLatitude(latitude) {
  const height = Math.sin(latitude), width = Math.cos(latitude);
  return d3.range(0, 361, 6).map((turn) => [width * Math.cos(turn * Math.PI / 180), width * Math.sin(turn * Math.PI / 180), height]);
}

function meridian(longitude) {
  return d3.range(-90, 91, 6).map((latitude) => {
    const angle = latitude * Math.PI / 180;
    return [Math.cos(angle) * Math.cos(longitude), Math.cos(angle) * Math.sin(longitude), Math.sin(angle)];
  });
}

/** A line on the sphere as pieces in front and behind. */
function linePieces(points) {
  const pieces = {front: "", behind: ""};
  for (let i = 1; i < points.length; ++i) {
    const from = onPaper(points[i - 1]), to = onPaper(points[i]);
    pieces[from.z + to.z >= 0 ? "front" : "behind"] += `M${from.x.toFixed(1)} ${from.y.toFixed(1)}L${to.x.toFixed(1)} ${to.y.toFixed(1)}`;
  }
  return pieces;
}

/** Points on the straight way between two states: what happens within a station is not known here. */
function between(one, other) {
  const steps = 16;
  return d3.range(0, steps + 1).map((step) => one.map((value, axis) => value + (other[axis] - value) * step / steps));
}

function drawSphere(parent, states) {
  const figure = parent.append("figure").attr("id", "sphere");
  const svg = picture(figure, sphere.size, sphere.size, "Poincaré sphere with the chief ray's state behind each station",
    states.map((d) => `${d.words}: S1 ${quantity(d.point[0])}, S2 ${quantity(d.point[1])}, S3 ${quantity(d.point[2])}`).join("; "));
  svg.style("max-width", sphere.size + "px").attr("tabindex", 0).attr("role", "application")
    .attr("aria-roledescription", "sphere that arrow keys turn");
  const drawn = svg.append("g");
  const redraw = () => {
    drawn.selectAll("*").remove();
    drawn.append("circle").attr("class", "sphere-edge").attr("cx", sphere.size / 2).attr("cy", sphere.size / 2).attr("r", sphere.radius);
    const lines = [circleOfLatitude(0), circleOfLatitude(Math.PI / 4), circleOfLatitude(-Math.PI / 4)]
      .concat(d3.range(0, 8).map((eighth) => meridian(eighth * Math.PI / 4)));
    lines.forEach((line) => {
      const pieces = linePieces(line);
      drawn.append("path").attr("class", "sphere-line").attr("d", pieces.behind);
      drawn.append("path").attr("class", "sphere-line front").attr("d", pieces.front);
    });
    [["S1", [1.2, 0, 0]], ["S2", [0, 1.2, 0]], ["S3, right (IEEE)", [0, 0, 1.24]], ["left (IEEE)", [0, 0, -1.24]]].forEach(([words, point]) => {
      const place = onPaper(point);
      drawn.append("text").attr("class", "quiet").attr("x", place.x).attr("y", place.y + 4).attr("text-anchor", "middle").text(words);
    });
    for (let i = 1; i < states.length; ++i) {
      const pieces = linePieces(between(states[i - 1].point, states[i].point));
      drawn.append("path").attr("class", "sphere-path behind").attr("d", pieces.behind);
      drawn.append("path").attr("class", "sphere-path").attr("d", pieces.front);
    }
    const points = drawn.selectAll("circle.sphere-point").data(states).enter().append("circle")
      .attr("cx", (d) => onPaper(d.point).x).attr("cy", (d) => onPaper(d.point).y)
      .attr("class", (d) => "sphere-point" + (onPaper(d.point).z < 0 ? " behind" : ""))
      .attr("r", (d) => d.number !== null && (state.station === d.number || lit.station === d.number) ? 7 : 4);
    points.append("title").text((d) => d.words);
    mark(points, "station", (d) => d.number === null ? -1 : d.number);
    labelPoints(drawn, states);
  };
  redraw();
  watch(redraw);
  const turn = (yaw, pitch) => {
    sphere.yaw += yaw;
    sphere.pitch = Math.max(-89, Math.min(89, sphere.pitch + pitch));
    redraw();
  };
  svg.call(d3.drag().on("drag", () => turn(-0.5 * d3.event.dx, 0.5 * d3.event.dy)));
  svg.on("keydown", () => {
    const step = {ArrowLeft: [10, 0], ArrowRight: [-10, 0], ArrowUp: [0, -10], ArrowDown: [0, 10]}[d3.event.key];
    if (!step) return;
    d3.event.preventDefault();
    d3.event.stopPropagation();
    turn(step[0], step[1]);
  });
  figure.append("figcaption").text("The chief ray's state behind each station, by its number; 0 is the launched one. Drag or use the arrow keys to turn it. Hollow points lie on the far side.");
}

/** Numbers beside the points; states at the same place share one label. */
function labelPoints(drawn, states) {
  const labels = [];
  states.forEach((d) => {
    const place = onPaper(d.point);
    const near = labels.find((label) => Math.hypot(label.x - place.x, label.y - place.y) < 9);
    const number = d.number === null ? 0 : d.number;
    if (near) near.numbers.push(number);
    else labels.push({x: place.x, y: place.y, numbers: [number]});
  });
  drawn.selectAll("text.point-label").data(labels).enter().append("text").attr("class", "point-label").attr("x", (d) => d.x + 9)
    .attr("y", (d) => d.y + 4).text((d) => ranges(d.numbers));
}

/** `1–4, 7` */
function ranges(numbers) {
  const words = [];
  numbers.forEach((number) => {
    const last = words[words.length - 1];
    if (last && last[1] === number - 1) last[1] = number;
    else words.push([number, number]);
  });
  return words.map(([from, to]) => from === to ? String(from) : `${from}–${to}`).join(", ");
}
