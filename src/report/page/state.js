// What the reader looks at: one small object, kept in the address's fragment, so that a link opens the same view.
const nothingChosen = {station: null, ghost: null, wavelength: null, field: null, unit: "fraction"};
const state = Object.assign({}, nothingChosen);
const lit = {station: null, ghost: null}; // what is pointed at or focused; never in the address
const watchers = [];

function watch(watcher) {
  watchers.push(watcher);
}

function tellAll(change) {
  watchers.forEach((watcher) => watcher(change));
}

function writeAddress() {
  const parts = [];
  Object.keys(state).forEach((key) => {
    if (state[key] !== nothingChosen[key]) parts.push(key + "=" + encodeURIComponent(state[key]));
  });
  const address = parts.length ? "#" + parts.join("&") : location.pathname + location.search;
  history.replaceState(null, "", address);
}

function choose(change) {
  Object.assign(state, change);
  writeAddress();
  tellAll(change);
}

function light(what, number) {
  if (lit[what] === number) return;
  lit[what] = number;
  tellAll({lit: what});
}

function clearChoice() {
  lit.station = lit.ghost = null;
  choose({station: null, ghost: null});
}

/** Reads what the address asks for, as far as there is such a thing. */
function readAddress(limits) {
  const wanted = {};
  location.hash.replace(/^#/, "").split("&").forEach((part) => {
    const equals = part.indexOf("=");
    if (equals < 0) return;
    let value = part.slice(equals + 1);
    try { value = decodeURIComponent(value); } catch (error) { return; }
    wanted[part.slice(0, equals)] = value;
  });
  const whole = (text, most) => /^[1-9][0-9]*$/.test(text || "") && Number(text) <= most ? Number(text) : null;
  state.station = whole(wanted.station, limits.stations);
  state.ghost = whole(wanted.ghost, limits.ghosts);
  state.wavelength = limits.wavelengths.indexOf(Number(wanted.wavelength)) >= 0 ? Number(wanted.wavelength) : null;
  state.field = state.wavelength === null ? whole(wanted.field, limits.fields) : null;
  state.unit = Object.prototype.hasOwnProperty.call(units, wanted.unit) ? wanted.unit : "fraction";
}

/** Makes an element point at a station or ghost when the mouse or the focus is on it, and choose it on a click. */
function pointsAt(selection, what, numberOf) {
  selection
    .on("mouseenter.light", (d) => light(what, numberOf(d)))
    .on("mouseleave.light", () => light(what, null))
    .on("focus.light", (d) => light(what, numberOf(d)))
    .on("blur.light", () => light(what, null))
    .on("click.choose", (d) => choose({[what]: state[what] === numberOf(d) ? null : numberOf(d)}));
}

/** Marks what is lit and what is chosen among the elements of a selection. */
function mark(selection, what, numberOf) {
  selection
    .classed("lit", (d) => lit[what] === numberOf(d))
    .classed("chosen", (d) => state[what] === numberOf(d));
}
