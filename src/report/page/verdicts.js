// Does it meet? One row a requirement: words, limit, value with its whisker on a short scale, margin.

function senseWords(verdict) {
  return verdict.sense === "at_least" ? "at least" : "at most";
}

const ghostFigures = {total: "All ghosts together", brightest: "Brightest ghost", returned: "Light that returns", not_followed: "Light not followed"};

/** A path of the JSON in words a reviewer knows; the path itself where there are none. */
function quantityWords(path) {
  const budgetPath = path.replace(/^budget\./, "");
  let found;
  if (budgetPath === "delivered") return "Delivered";
  if ((found = budgetPath.match(/^by_field\[(\d+)\]\.delivered$/)) && budget.by_field[found[1]]) return "Delivered of " + fieldName(Number(found[1]));
  if ((found = budgetPath.match(/^by_wavelength\[(\d+)\]\.delivered$/)) && budget.by_wavelength[found[1]])
    return `Delivered at ${plain(budget.by_wavelength[found[1]].wavelength_nm)} nm`;
  if ((found = budgetPath.match(/^stations\.(.*)\.([a-z_]+(?:\.[a-z]+)?)$/)) && stationNumber(found[1]))
    return `${found[2].replace(/_/g, " ").replace(".", ", ")} at ${stationName(stationNumber(found[1]))}`;
  if ((found = path.match(/^ghosts\.([a-z_]+)$/)) && ghostFigures[found[1]]) return ghostFigures[found[1]];
  if ((found = path.match(/^polarization\.(detector|chief)\.([a-z_]+)$/)))
    return `${found[2].replace(/_deg$/, ", deg").replace(/_/g, " ")} ${found[1] === "detector" ? "at the detector" : "of the chief ray"}`;
  return path;
}

/** The section that explains a quantity. */
function sectionOf(path) {
  if (path.indexOf("ghosts") === 0) return "ghosts";
  if (path.indexOf("polarization") === 0) return "polarization";
  return "light";
}

/** A short scale that holds value, limit and whisker: from zero where both are positive. */
function bulletScale(verdict, width) {
  const reach = 2 * (verdict.uncertainty || 0);
  const marks = [verdict.limit];
  if (verdict.value !== null) marks.push(verdict.value - reach, verdict.value + reach);
  const least = d3.min(marks);
  const most = d3.max(marks);
  const from = least >= 0 ? 0 : least;
  const room = 0.12 * ((most - from) || Math.abs(most) || 1);
  return d3.scaleLinear().domain([from < 0 ? from - room : from, most + room]).range([0, width]);
}

// After Few's bullet graph (2006): the value as a bar, the limit as a line across it.
function bullet(cell, verdict) {
  const width = 180;
  const x = bulletScale(verdict, width);
  const words = verdict.value === null ? "no value" : `value ${quantity(verdict.value)}, limit ${plain(verdict.limit)}`;
  const svg = cell.append("svg").attr("viewBox", `0 0 ${width} 24`).attr("width", width).attr("height", 24)
    .attr("role", "img").attr("aria-label", words);
  svg.append("rect").attr("class", "bullet-range").attr("y", 5).attr("height", 14).attr("width", width);
  if (verdict.value !== null) {
    const zero = x(Math.max(x.domain()[0], 0));
    svg.append("rect").attr("class", "bullet-value " + verdictClass(verdict.met)).attr("y", 9).attr("height", 6)
      .attr("x", Math.min(zero, x(verdict.value))).attr("width", Math.abs(x(verdict.value) - zero));
    if (verdict.uncertainty) {
      const low = x(verdict.value - 2 * verdict.uncertainty);
      const high = x(verdict.value + 2 * verdict.uncertainty);
      svg.append("path").attr("class", "whisker").attr("d", `M${low} 8v8m0 -4H${high}m0 -4v8`);
    }
  }
  const limit = x(verdict.limit);
  svg.append("line").attr("class", "bullet-limit").attr("x1", limit).attr("x2", limit).attr("y1", 2).attr("y2", 22);
}

function drawVerdicts() {
  const parent = d3.select("#verdicts");
  if (!verdicts.length) {
    parent.append("p").text("The file states no requirements; `requirements:` in it would.");
    return;
  }
  const made = parent.append("div").attr("class", "wide").append("table");
  made.append("caption").attr("class", "visually-hidden").text("Requirements");
  const heading = made.append("thead").append("tr");
  ["quantity", "verdict", "limit", "value", "± standard error", "margin", "on a scale"].forEach((words, index) =>
    heading.append("th").attr("scope", "col").classed("text", index < 2 || index === 6).text(words));
  const rows = made.append("tbody").selectAll("tr").data(verdicts).enter().append("tr");
  rows.each(function (verdict, index) {
    const row = d3.select(this);
    const path = `check.requirements[${index}]`;
    row.append("th").attr("scope", "row").attr("class", "text").each(function () {
      d3.select(this).append("div").text(quantityWords(verdict.quantity));
      d3.select(this).append("div").attr("class", "path").text(verdict.quantity);
    });
    const word = row.append("td").attr("class", "text");
    word.append("span").attr("class", "word " + verdictClass(verdict.met)).text(verdictWord(verdict.met));
    if (verdict.met !== true) {
      const section = sectionOf(verdict.quantity);
      word.append("span").text(": see ");
      word.append("a").attr("href", "#" + section).attr("data-section", section)
        .text(d3.select(`#${section}-heading`).text().toLowerCase().replace("?", ""));
    }
    row.append("td").text(`${senseWords(verdict)} ${plain(verdict.limit)}`);
    row.append("td").attr("data-quantity", path + ".value").attr("title", fullPrecision(verdict.value)).text(quantity(verdict.value));
    row.append("td").text(verdict.uncertainty === null ? dash : errorSize(verdict.uncertainty));
    row.append("td").attr("title", fullPrecision(verdict.margin))
      .text(verdict.margin === null ? dash : (verdict.margin > 0 ? "+" : "") + quantity(verdict.margin));
    bullet(row.append("td").attr("class", "text"), verdict);
  });
  if (verdicts.some((verdict) => verdict.met === null && verdict.value !== null))
    parent.append("p").text("A value within two standard errors of its limit cannot be told; --accuracy asks for more rays.");
}
