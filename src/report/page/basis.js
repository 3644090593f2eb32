// On what basis? The inputs, versions, sources, conventions, what is not followed, cautions.

const conventions = [
  "Fields go as exp(i(k·r − ωt)); a lossy medium has the index n + iκ with κ ≥ 0; wavelengths are in vacuum.",
  "Right and left handed are those of IEEE Std 145: right-handed turns counter-clockwise for an observer who faces the source. Many optics texts call that left.",
  "Azimuth turns from x toward y. x and y are those of the axis that arrives at a station; after a mirror x is reflected in its plane.",
  "Rays, wavelengths and fields add in power. All powers are fractions of the launched one."
];

const notFollowed = "Not followed: edges, mounts, scattered light, diffraction, fibre coupling, double refraction, the second port of a splitter.";

const caution = "Where lasers are concerned: figures of ghosts, returned light and focused spots are aids to a hazard analysis, not a substitute for one. " +
  "A laser safety officer and IEC 60825-1 decide.";

function allWarnings() {
  const all = [];
  [data.budget, data.check, data.ghosts, data.polarization].forEach((document_) => {
    if (document_) document_.warnings.forEach((warning) => { if (all.indexOf(warning) < 0) all.push(warning); });
  });
  return all;
}

function drawBasis() {
  const parent = d3.select("#basis-body");
  const warnings = allWarnings();
  if (warnings.length) {
    parent.append("h3").text("Warnings");
    parent.append("ul").selectAll("li").data(warnings).enter().append("li").text((d) => d);
  }
  parent.append("h3").text("How it was traced");
  facts(parent, [
    ["program", `lightledger ${data.budget.lightledger}, contract ${data.budget.contract}`],
    ["input", data.input.file],
    ["light", data.input.light],
    ["rays", budget.rays.toLocaleString("en").replace(/,/g, " ") + " for the budget"],
    ["delivered", `${budget.delivered.toPrecision(6)}, standard error ${errorSize(budget.uncertainty)}`],
    ["books close to", errorSize(budget.closure_error)]
  ]);
  if (budget.by_wavelength.length > 1) foldedTable(parent, "Delivered by wavelength", [
    {heading: "wavelength, nm", cell: (d) => plain(d.wavelength_nm)}, {heading: "delivered", cell: (d) => fraction(d.delivered), title: (d) => fullPrecision(d.delivered)}], budget.by_wavelength);
  if (budget.by_field.length > 1) foldedTable(parent, "Delivered by field", [
    {heading: "field", text: true, cell: (d) => d.name === null ? dash : d.name}, {heading: "x", cell: (d) => plain(d.at[0])}, {heading: "y", cell: (d) => plain(d.at[1])},
    {heading: "delivered", cell: (d) => fraction(d.delivered), title: (d) => fullPrecision(d.delivered)}], budget.by_field);
  parent.append("h3").text("Media");
  table(parent.append("div").attr("class", "wide"), "Media of this file, with the range in which each is known", [
    {heading: "medium", text: true, head: true, cell: (d) => d.name},
    {heading: "range, nm", cell: (d) => d.range_nm[1] === null ? `from ${plain(d.range_nm[0])}` : `${plain(d.range_nm[0])} to ${plain(d.range_nm[1])}`},
    {heading: "n at the first wavelength", cell: (d) => d.n === null ? dash : d.n.toFixed(5)},
    {heading: "κ", cell: (d) => d.kappa === null ? dash : quantity(d.kappa)},
    {heading: "source", text: true, long: true, cell: (d) => d.source || "the file"}], data.media);
  parent.append("h3").text("Conventions");
  parent.append("ul").selectAll("li").data(conventions).enter().append("li").text((d) => d);
  parent.append("p").attr("class", "caution").text(notFollowed);
  parent.append("p").attr("class", "caution").text(caution);
}
