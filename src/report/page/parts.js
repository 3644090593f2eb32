// Pieces that several sections are made of.

/** A table from columns {heading, text, cell(row), title(row), long}; `caption` says what it holds. */
function table(parent, caption, columns, rows) {
  const made = parent.append("table");
  made.append("caption").text(caption);
  const heading = made.append("thead").append("tr");
  columns.forEach((column) => heading.append("th").attr("scope", "col").classed("text", !!column.text).text(column.heading));
  const body = made.append("tbody");
  body.selectAll("tr").data(rows).enter().append("tr").each(function (row) {
    const line = d3.select(this);
    columns.forEach((column) => {
      const cell = line.append(column.head ? "th" : "td").classed("text", !!column.text).classed("long", !!column.long);
      if (column.head) cell.attr("scope", "row");
      cell.text(column.cell(row));
      if (column.title) cell.attr("title", column.title(row));
    });
  });
  return made;
}

/** The same folded away below a picture. */
function foldedTable(parent, summary, columns, rows) {
  const details = parent.append("details");
  details.append("summary").text(summary);
  return table(details.append("div").attr("class", "wide"), summary, columns, rows);
}

/** An SVG picture with a title and a description for those who cannot see it. */
function picture(parent, width, height, title, description) {
  const svg = parent.append("svg").attr("viewBox", `0 0 ${width} ${height}`).attr("role", "group")
    .attr("aria-label", title);
  svg.append("title").text(title);
  svg.append("desc").text(description);
  return svg;
}

/** Facts as a list of terms. */
function facts(parent, pairs) {
  const list = parent.append("dl").attr("class", "facts");
  pairs.forEach(([term, words]) => {
    list.append("dt").text(term);
    list.append("dd").text(words);
  });
  return list;
}

/** What the row, picture or point tells, for a title or a screen reader. */
function fullPrecision(value) {
  return value === null || value === undefined ? "does not exist" : String(value);
}

/** Right or left handed, as IEEE says it. */
function handedness(ellipticity) {
  if (ellipticity === null || Math.abs(ellipticity) < 0.05) return "linear";
  return ellipticity > 0 ? "right-handed (IEEE)" : "left-handed (IEEE)";
}
