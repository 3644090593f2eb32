// The four questions in ten seconds.

function verdictWord(met) {
  return met === null ? "cannot be told" : met ? "met" : "not met";
}

function verdictClass(met) {
  return met === null ? "open" : met ? "met" : "not-met";
}

function largestLosses(howMany) {
  const entries = [];
  stations.forEach((station, index) => losses.forEach((loss) => {
    if (station[loss] > 0) entries.push({number: index + 1, loss: loss, power: station[loss]});
  }));
  entries.sort((one, other) => other.power - one.power);
  return entries.slice(0, howMany);
}

function glanceItem(parent, label, large, kind, words) {
  const item = parent.append("div");
  item.append("p").attr("class", "label").text(label);
  item.append("p").attr("class", "large " + kind).text(large);
  item.append("p").attr("class", "words").text(words);
  return item;
}

function glanceVerdict(parent) {
  if (!verdicts.length) {
    glanceItem(parent, "Requirements", "none stated", "open", "The file states no requirements.");
    return;
  }
  const missed = verdicts.filter((verdict) => verdict.met === false);
  const open = verdicts.filter((verdict) => verdict.met === null);
  const large = missed.length ? counted(missed.length, "requirement") + " not met"
    : open.length ? counted(open.length, "requirement") + " cannot be told"
    : verdicts.length === 1 ? "The requirement is met" : "All " + verdicts.length + " requirements met";
  const worst = missed[0] || open[0];
  const words = worst ? `${quantityWords(worst.quantity)}: ${quantity(worst.value)}, ${senseWords(worst)} ${plain(worst.limit)}.`
    : "Every one by more than its uncertainty.";
  glanceItem(parent, "Requirements", large, missed.length ? "not-met" : open.length ? "open" : "met", words);
}

function glanceLight(parent) {
  const largest = largestLosses(1)[0];
  const words = largest ? `Largest loss: ${stationName(largest.number)}, ${largest.loss} ${perCent(largest.power)}.`
    : "Nothing is lost.";
  const item = glanceItem(parent, "Delivered", "", "", words);
  item.select(".large").append("span").attr("data-quantity", "budget.delivered")
    .attr("title", fullPrecision(budget.delivered)).text(budget.delivered < 0.01 ? quantity(budget.delivered) : fraction(budget.delivered));
  if (budget.uncertainty !== null)
    item.select(".large").append("span").text(" ± " + errorSize(budget.uncertainty));
}

function glanceGhosts(parent) {
  if (!ghosts) return;
  const brightest = ghostPaths[0];
  if (!brightest) {
    glanceItem(parent, "Ghosts", "none", "", "No unintended reflection reaches the detector.");
    return;
  }
  glanceItem(parent, "Ghosts, of delivered", relativeWords(ghosts.total / budget.delivered), "",
    `Brightest: ${bounceWords(brightest)}, ${relativeWords(brightest.relative_power)} over ${quantity(brightest.rms_radius_mm)} mm rms.`);
}

function glancePolarization(parent) {
  if (!polarization) return;
  const detector = polarization.detector;
  const leak = detector.cross_leakage;
  const worst = worstOffender();
  const words = worst ? `Largest share: ${worst.name}.` : "No station stands out.";
  if (leak !== null)
    glanceItem(parent, "Polarization, cross leakage", perCent(leak), "", words);
  else
    glanceItem(parent, "Polarization, diattenuation", quantity(detector.diattenuation), "", words);
}

function drawGlance() {
  const parent = d3.select("#glance");
  glanceVerdict(parent);
  glanceLight(parent);
  glanceGhosts(parent);
  glancePolarization(parent);
}
