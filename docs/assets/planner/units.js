// @ts-check
/*
 * Quantities as people write them, `500 nm +/- 10 nm`, to numbers in canonical units, by the closed table that
 * comes with the data. Twin of builder/records/{quantities,amounts,unit_table}.py; cases shared with it stand in
 * tests/cases/quantities.json.
 */
(function (ew) {
  "use strict";

  const NUMBER = "[-+]?(?:[0-9]+(?:\\.[0-9]*)?|\\.[0-9]+)(?:[eE][-+]?[0-9]+)?";
  const UNIT = "[A-Za-zÅ°º%μµ][^<>=±:,;]*?";
  const AMOUNT = new RegExp("^(" + NUMBER + ")\\s*(" + UNIT + ")?$");
  const RANGE = new RegExp("^(" + NUMBER + ")\\s*(" + UNIT + ")??\\s*(?:\\.\\.|(?<![eE])-|\\bto\\b)\\s*(" + NUMBER + ")\\s*(" + UNIT + ")?$");
  const BARE = new RegExp("^" + NUMBER + "$");
  const LIMIT = /^(<=|>=|<|>)\s*(.*)$/;
  const PLUS_MINUS = /\s*(?:\+\/-|\+-|±)\s*/;
  const NOT_FINITE = /^[-+]?\.?(?:nan|inf|infinity|∞)(?![A-Za-z]).*$/i;
  /** Raised, lowered and broken digits beside digits: normalising would make 102 of 10². */
  const RAISED = /[0-9][⁰¹²³⁴-⁹₀-₉½¼¾⅓⅔⅛]|[½¼¾⅓⅔⅛]/;
  const MAX_LENGTH = 80;
  const FRACTIONS = new Set(["percent", "mass_fraction", "volume_fraction", "atomic_fraction"]);

  /** Why a text is no quantity; `rule` names the fault as the Python reader does. */
  class QuantityError extends Error {
    /** @param {string} rule @param {string} message */
    constructor(rule, message) {
      super(message);
      this.rule = rule;
    }
  }

  /** A table of units by dimension and spelling, from the data's plain table. @param {any} plain @returns {UnitTable} */
  function tableOf(plain) {
    if (plain.format !== 1) throw new Error("the unit table has another form");
    const table = new Map();
    for (const name of Object.keys(plain.dimensions)) {
      const dimension = plain.dimensions[name];
      const bySpelling = new Map();
      for (const unit of dimension.units) for (const spelling of unit.spellings) bySpelling.set(spelling, unit);
      table.set(name, { signed: dimension.signed, canonical: dimension.canonical, bySpelling: bySpelling });
    }
    return table;
  }

  /** A unit as the table spells it. @param {string} text */
  function normalSpelling(text) {
    // The ordinal sign is a common stand-in for the degree sign, and NFKC would make a letter of it.
    let letters = text.replace(/º/g, "°").normalize("NFKC").replace(/μ/g, "u").replace(/\^/g, "");
    letters = letters.trim().replace(/\s*([/%])\s*/g, "$1");
    return letters.replace(/\s+/g, " ").replace(/° C/g, "°C");
  }

  /** @param {UnitTable} table @param {string} spelling @param {string} dimension */
  function findUnit(table, spelling, dimension) {
    const units = /** @type {UnitsOf} */ (table.get(dimension)).bySpelling;
    return units.get(spelling) || units.get(normalSpelling(spelling));
  }

  /** @param {UnitTable} table @param {string | undefined} spelling @param {string} dimension @param {string} text */
  function unitOf(table, spelling, dimension, text) {
    const words = dimension.replace(/_/g, " ");
    if (spelling === undefined) throw new QuantityError("unit-missing", '"' + text + '" needs a unit of ' + words);
    const unit = findUnit(table, spelling, dimension);
    if (unit) return unit;
    const isElsewhere = Array.from(table.keys()).some((other) => findUnit(table, spelling, other));
    if (isElsewhere) throw new QuantityError("unit-mismatch", '"' + text + '": ' + spelling.trim() + " is not a unit of " + words);
    throw new QuantityError("unit-unknown", '"' + text + '": there is no unit "' + spelling.trim() + '"');
  }

  /** @param {number} number @param {Unit} unit @param {string} text */
  function canonical(number, unit, text) {
    const value = (number * unit.factor) / unit.divisor + unit.offset;
    if (!Number.isFinite(value) || (value === 0 && number !== 0 && unit.offset === 0)) {
      throw new QuantityError("not-finite", '"' + text + '" is out of the range of numbers');
    }
    return value;
  }

  /** @param {string} plain @param {string} text */
  function numberOf(plain, text) {
    if (!BARE.test(plain)) throw notANumber(plain, text);
    const value = Number(plain);
    if (!Number.isFinite(value) || (value === 0 && /[1-9]/.test(plain.split(/[eE]/)[0]))) {
      throw new QuantityError("not-finite", '"' + text + '" is out of the range of numbers');
    }
    return value;
  }

  /** @param {string} plain @param {string} text */
  function notANumber(plain, text) {
    if (NOT_FINITE.test(plain)) return new QuantityError("not-finite", '"' + text + '" is not a finite number');
    return new QuantityError("not-a-number", '"' + text + '" is not a number');
  }

  /** @param {UnitTable} table @param {string} plain @param {string} dimension @param {string} text */
  function amount(table, plain, dimension, text) {
    const match = AMOUNT.exec(plain);
    if (!match) throw notANumber(plain, text);
    const number = numberOf(match[1], text);
    const unit = unitOf(table, match[2], dimension, text);
    return { value: canonical(number, unit, text), unit: unit };
  }

  /** @param {string} text */
  function normalText(text) {
    if (text.length > MAX_LENGTH) throw new QuantityError("not-a-number", '"' + text.slice(0, MAX_LENGTH) + '..." is too long for a quantity');
    if (RAISED.test(text)) throw new QuantityError("not-a-number", '"' + text + '" holds raised or broken digits');
    const plain = text.replace(/º/g, "°").normalize("NFKC").replace(/[\u2212\u2013\u2010]/g, "-");
    return plain.replace(/≤/g, "<=").replace(/≥/g, ">=").trim();
  }

  /**
   * The quantity that a text states: `form` is value, range, below or above; unknown ends are null.
   * @param {UnitTable} table @param {string} text @param {string} dimension @returns {Quantity}
   * @throws {QuantityError} where the text states none
   */
  function parse(table, text, dimension) {
    const found = parsed(table, text, dimension);
    checkSign(table, found, dimension);
    return found;
  }

  /** @param {UnitTable} table @param {string} text @param {string} dimension @returns {Quantity} */
  function parsed(table, text, dimension) {
    const simple = AMOUNT.exec(text);
    if (simple && simple[2]) {
      const unit = findUnit(table, simple[2], dimension);
      if (unit) return quantity(text, unit, { value: canonical(numberOf(simple[1], text), unit, text) });
    }
    const plain = normalText(text);
    const limit = LIMIT.exec(plain);
    if (limit) {
      const { value, unit } = amount(table, limit[2], dimension, text);
      const isBelow = limit[1].startsWith("<");
      return quantity(text, unit, isBelow ? { form: "below", high: value } : { form: "above", low: value });
    }
    const parts = plain.split(PLUS_MINUS);
    if (parts.length > 2) throw notANumber(plain, text);
    if (parts.length === 2) return withTolerance(table, parts[0], parts[1], dimension, text);
    const range = RANGE.exec(plain);
    if (range) return rangeOf(table, range, dimension, text);
    const { value, unit } = amount(table, plain, dimension, text);
    return quantity(text, unit, { value: value });
  }

  /** @param {string} text @param {Unit} unit @param {Partial<Quantity>} ends @returns {Quantity} */
  function quantity(text, unit, ends) {
    return Object.assign({ text: text, unit: unit.symbol, form: "value", value: null, halfWidth: null, low: null, high: null }, ends);
  }

  /** @param {UnitTable} table @param {RegExpExecArray} match @param {string} dimension @param {string} text */
  function rangeOf(table, match, dimension, text) {
    const highUnit = unitOf(table, match[4], dimension, text);
    const lowUnit = match[2] === undefined ? highUnit : unitOf(table, match[2], dimension, text);
    const low = canonical(numberOf(match[1], text), lowUnit, text);
    const high = canonical(numberOf(match[3], text), highUnit, text);
    if (low > high) throw new QuantityError("range-reversed", '"' + text + '" starts above its end');
    return quantity(text, highUnit, { form: "range", low: low, high: high });
  }

  /** @param {UnitTable} table @param {string} before @param {string} after @param {string} dimension @param {string} text */
  function withTolerance(table, before, after, dimension, text) {
    const tolerance = AMOUNT.exec(after);
    if (!tolerance) throw notANumber(after, text);
    const spelling = tolerance[2];
    let found;
    if (BARE.test(before) && spelling !== undefined) {
      const unit = unitOf(table, spelling, dimension, text);
      found = { value: canonical(numberOf(before, text), unit, text), unit: unit };
    } else {
      found = amount(table, before, dimension, text);
    }
    const half = halfWidth(table, numberOf(tolerance[1], text), spelling, found.value, dimension, text);
    // A zero would claim exactness; who does not know the uncertainty leaves it out.
    if (!Number.isFinite(half) || half <= 0) throw new QuantityError("tolerance-not-positive", '"' + text + '" needs a number above zero after +/-');
    return quantity(text, found.unit, { value: found.value, halfWidth: half });
  }

  /** @param {UnitTable} table @param {number} number @param {string | undefined} spelling @param {number} value @param {string} dimension @param {string} text */
  function halfWidth(table, number, spelling, value, dimension, text) {
    if (spelling !== undefined && normalSpelling(spelling) === "%" && dimension !== "percent") {
      if (FRACTIONS.has(dimension) || dimension === "temperature") {
        throw new QuantityError("unit-mismatch", '"' + text + '": a percentage of this can be read in two ways');
      }
      return (Math.abs(value) * number) / 100;
    }
    const inDimension = dimension === "temperature" ? "temperature_difference" : dimension;
    return canonical(number, unitOf(table, spelling, inDimension, text), text);
  }

  /** @param {UnitTable} table @param {Quantity} found @param {string} dimension */
  function checkSign(table, found, dimension) {
    if (/** @type {UnitsOf} */ (table.get(dimension)).signed) return;
    const numbers = [found.value, found.low, found.high].filter((one) => one !== null);
    if (Math.min(.../** @type {number[]} */ (numbers)) < 0) {
      const floor = dimension === "temperature" ? "absolute zero" : "zero";
      throw new QuantityError("negative", '"' + found.text + '" is below ' + floor);
    }
    // "Less than nothing" would claim that nothing at all was there: no measurement can say so.
    if (found.high === 0) throw new QuantityError("not-positive", '"' + found.text + '" must be more than zero');
  }

  ew.units = Object.freeze({ tableOf, parse, QuantityError });
})((globalThis.etchwright = globalThis.etchwright || {}));
