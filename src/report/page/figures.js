// Numbers for a person: four significant digits, a dash for exactly nothing; the same rules as in the terminal.
const dash = "–";

function fraction(value) {
  if (value === 0) return dash;
  return Math.abs(value) < 0.5e-4 ? "<0.0001" : value.toFixed(4);
}

function perCent(value) {
  const hundredths = 100 * value;
  if (value === 0) return dash;
  if (Math.abs(hundredths) < 0.01) return "<0.01 %";
  if (Math.abs(hundredths) >= 9.95) return hundredths.toFixed(1) + " %";
  return hundredths.toPrecision(2) + " %";
}

function decibels(value) {
  return value > 0 ? (10 * Math.log10(value)).toFixed(3) : dash;
}

/** Any other quantity, to four significant digits. */
function quantity(value) {
  if (value === null || value === undefined) return dash;
  if (value === 0) return "0";
  const size = Math.abs(value);
  return size >= 1e-4 && size < 1e6 ? value.toPrecision(4) : value.toExponential(3).replace("e+", "e");
}

/** A number without trailing zeros, as one would write it. */
function plain(value) {
  return String(Number(value.toPrecision(6)));
}

function errorSize(value) {
  return value === null ? dash : String(Number(value.toPrecision(1)));
}

/** A number of things with its word. */
function counted(count, one, many) {
  return count + " " + (count === 1 ? one : many || one + "s");
}

const units = {
  fraction: {label: "fraction", format: fraction},
  percent: {label: "per cent", format: (value) => perCent(value).replace(" %", "")},
  dB: {label: "dB", format: decibels}
};

/** A fraction of power in the unit that the reader chose. */
function power(value) {
  return value === null || value === undefined ? dash : units[state.unit].format(value);
}
