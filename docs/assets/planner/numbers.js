// @ts-check
/*
 * Numbers to text, shortened as the interval decides and always outwards. Twin of builder/views/number_text.py.
 */
(function (ew) {
  "use strict";

  const NO_BREAK = "\u00a0";
  const UNKNOWN = "unknown";
  const FEWEST = 2;
  const MOST = 3;
  const WIDTH_DIGITS = 2;
  const LENGTHS = [["mm", 1e6, 1e6], ["µm", 1e3, 1e3], ["nm", 1, 0]];
  const RATES = [["µm/min", 1e3, 1e3], ["nm/min", 1, 0]];

  /** A number as its digits and the place of the last one, freed of the noise in the last bit. @param {number} value */
  function decimal(value) {
    const [mantissa, exponent] = value.toExponential(11).split("e");
    const digits = mantissa.replace(".", "");
    const isNegative = digits.startsWith("-");
    return { units: BigInt(digits.replace("-", "")), scale: Number(exponent) - 11, isNegative: isNegative };
  }

  /** Units of 10 to the power of -places. @param {number} value @param {number} places @param {string} rounding nearest, down or up @returns {bigint} */
  function rounded(value, places, rounding) {
    const { units, scale, isNegative } = decimal(value);
    const shift = scale + places;
    if (shift >= 0) return (isNegative ? -units : units) * 10n ** BigInt(shift);
    const divisor = 10n ** BigInt(-shift);
    const whole = units / divisor;
    const rest = units % divisor;
    let up = false;
    if (rounding === "nearest") up = rest * 2n > divisor || (rest * 2n === divisor && whole % 2n === 1n);
    else up = rest > 0n && (rounding === "up") !== isNegative;
    const size = up ? whole + 1n : whole;
    return isNegative ? -size : size;
  }

  /** @param {number} value @param {number} places @param {string} rounding */
  function placed(value, places, rounding) {
    const units = rounded(value, places, rounding);
    const size = units < 0n ? -units : units;
    let text = size.toString();
    if (places < 0) text += units === 0n ? "" : "0".repeat(-places);
    else if (places > 0) {
      text = text.padStart(places + 1, "0");
      text = text.slice(0, -places) + "." + text.slice(-places);
    }
    return units < 0n ? "\u2212" + text : text;
  }

  /** Place of the first digit. @param {number} value */
  function exponent(value) {
    return value === 0 ? 0 : Number(value.toExponential(16).split("e")[1]);
  }

  /** @param {number} value @param {number | null} wanted */
  function placesOf(value, wanted) {
    const fewest = FEWEST - 1 - exponent(value);
    return wanted === null ? fewest : Math.min(Math.max(wanted, fewest), MOST - 1 - exponent(value));
  }

  /** @param {number} value @param {number | null} wanted @param {string} rounding */
  function shortened(value, wanted, rounding) {
    return value === 0 ? "0" : placed(value, placesOf(value, wanted), rounding);
  }

  /** Decimal places that show the interval's width to two digits. @param {number} low @param {number} high */
  function stepOf(low, high) {
    const width = Math.abs(high - low);
    return width === 0 ? null : WIDTH_DIGITS - 1 - exponent(width);
  }

  /** Both ends, moved outwards. @param {number} low @param {number} high */
  function interval(low, high) {
    const step = stepOf(low, high);
    const places = [low, high].filter((end) => end !== 0).map((end) => placesOf(end, step));
    const shared = places.length ? Math.min(...places) : 0;
    const at = (/** @type {number} */ value, /** @type {string} */ rounding) => (value === 0 ? "0" : placed(value, shared, rounding));
    // Both ends to the same place, unless that costs the small one its digits.
    const apart = low !== 0 && shared < FEWEST - 1 - exponent(low);
    const shown = apart ? [shortened(low, step, "down"), shortened(high, step, "up")] : [at(low, "down"), at(high, "up")];
    return shown.join(NO_BREAK + "–\u2060" + NO_BREAK);
  }

  /** @param {any[][]} units @param {number | null} low @param {number | null} mid @param {number | null} high */
  function inUnit(units, low, mid, high) {
    const leading = [mid, high, low].find((value) => value !== null);
    if (leading === undefined || leading === null) return { value: UNKNOWN, unit: "", interval: "" };
    const unit = units.find((one) => Math.abs(leading) >= one[2]) || units[units.length - 1];
    const scale = (/** @type {number | null} */ value) => (value === null ? null : value / unit[1]);
    return Object.assign({ unit: unit[0], interval: "" }, bounded(scale(low), scale(mid), scale(high)));
  }

  /** @param {number | null} low @param {number | null} mid @param {number | null} high */
  function bounded(low, mid, high) {
    if (mid === null) {
      if (low !== null && high !== null) return { value: interval(low, high) };
      if (high !== null) return { value: "at most " + shortened(high, null, "up") };
      return { value: "at least " + shortened(/** @type {number} */ (low), null, "down") };
    }
    const ends = low !== null && high !== null;
    const value = shortened(mid, ends ? stepOf(low, high) : null, "nearest");
    return ends ? { value: value, interval: interval(low, high) } : { value: value };
  }

  /** @param {string} number @param {string} unit */
  function joined(number, unit) {
    return unit ? number + NO_BREAK + unit : number;
  }

  /** A length in nm. @param {number | null} low @param {number | null} mid @param {number | null} high */
  function length(low, mid, high) {
    return inUnit(LENGTHS, low, mid, high);
  }

  /** A rate in nm/s, shown a minute. @param {number | null} low @param {number | null} mid @param {number | null} high */
  function rate(low, mid, high) {
    const minute = (/** @type {number | null} */ value) => (value === null ? null : value * 60);
    return inUnit(RATES, minute(low), minute(mid), minute(high));
  }

  /** A number and its unit. @param {{value: string, unit: string}} text */
  function withUnit(text) {
    return text.value === UNKNOWN ? UNKNOWN : joined(text.value, text.unit);
  }

  /** A number with its interval in brackets. @param {{value: string, unit: string, interval: string}} text */
  function full(text) {
    return text.interval ? withUnit(text) + " (" + joined(text.interval, text.unit) + ")" : withUnit(text);
  }

  /** One length without an interval. @param {number} valueNm */
  function plainLength(valueNm) {
    return withUnit(length(null, valueNm, null));
  }

  /** A time as people set timers. @param {number | null} timeS @param {string} [rounding] */
  function time(timeS, rounding) {
    if (timeS === null) return UNKNOWN;
    const way = rounding || "nearest";
    const found = [[10, 0.1], [120, 1], [600, 5], [3600, 10]].find((row) => timeS < row[0]);
    const step = found ? found[1] : 60;
    if (timeS > 0 && step < 1) {
      const tenths = placed(timeS, 1, way);
      return joined(tenths === "0.0" ? "0" : tenths, "s");
    }
    return clock(Number(rounded(timeS / step, 0, way)) * Math.trunc(step));
  }

  /** @param {number} seconds */
  function clock(seconds) {
    const parts = [[Math.floor(seconds / 3600), "h"], [Math.floor((seconds % 3600) / 60), "min"], [seconds % 60, "s"]];
    const shown = parts.filter((part) => part[0]).map((part) => joined(String(part[0]), String(part[1])));
    return shown.length ? shown.join(NO_BREAK) : joined("0", "s");
  }

  /** A temperature in K as whole degrees Celsius. @param {number | null} kelvin */
  function temperature(kelvin) {
    return kelvin === null ? UNKNOWN : joined(placed(kelvin - 273.15, 0, "nearest"), "°C");
  }

  /** A number to three significant digits. @param {number} value */
  function plain(value) {
    return value === 0 ? "0" : placed(value, MOST - 1 - exponent(value), "nearest");
  }

  /** Running text with the signs of units as people read them: "at 80 degC" is "at 80 °C". @param {string} text */
  function inWords(text) {
    const read = { degC: "°C", um: "µm", μm: "µm" };
    // Only right after a number: "um" alone is a word of other languages.
    return text.replace(/(?<=\d)[ \u00a0](degC|um|μm)\b/g, (_whole, unit) => NO_BREAK + read[/** @type {keyof typeof read} */ (unit)]);
  }

  ew.numbers = Object.freeze({ length, rate, withUnit, full, plainLength, time, temperature, plain, inWords, UNKNOWN });
})((globalThis.etchwright = globalThis.etchwright || {}));
