// Puts the page together.

function allSections() {
  readAddress({
    stations: stations.length,
    ghosts: ghostPaths.length,
    fields: fieldLedgers.length,
    wavelengths: wavelengthLedgers.map((ledger) => ledger.wavelength_nm)
  });
  drawGlance();
  drawVerdicts();
  drawLightControls();
  wireDrawing();
  drawStream();
  drawLossKey();
  drawLedger();
  drawGhosts();
  drawPolarization();
  drawCoatings();
  drawBasis();
  tellStation();
  watch(tellStation);
}

/** The fragment holds the state, so links within the page scroll by themselves. */
function wireLinks() {
  d3.selectAll("a[data-section], a.skip").on("click", function () {
    d3.event.preventDefault();
    const section = document.querySelector(this.getAttribute("href"));
    section.scrollIntoView();
    section.setAttribute("tabindex", "-1");
    section.focus({preventScroll: true});
  });
}

function wireKeys() {
  d3.select(document).on("keydown", () => {
    const inside = d3.event.target.closest("input, select, textarea, pre, button, [role=application]");
    if (d3.event.key === "Escape") clearChoice();
    if (inside || d3.event.ctrlKey || d3.event.metaKey || d3.event.altKey) return;
    const step = {ArrowRight: 1, ArrowLeft: -1}[d3.event.key];
    if (!step) return;
    d3.event.preventDefault();
    stepStation(step);
  });
}

/** Print has no folds to open, but rows by the hundred serve nobody on paper. */
function openForPrint() {
  const folded = [];
  window.addEventListener("beforeprint", () => {
    document.querySelectorAll("details:not([open]):not(#coatings details)").forEach((details) => {
      details.open = true;
      folded.push(details);
    });
  });
  window.addEventListener("afterprint", () => folded.splice(0).forEach((details) => { details.open = false; }));
}

allSections();
wireLinks();
wireKeys();
openForPrint();
