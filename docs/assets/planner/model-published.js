// @ts-check
/*
 * Ranks of evidence, and the envelope of published rates, nm/s. Twin of builder/engine/{rank,evidence}.py.
 */
(function (ew) {
  "use strict";

  /** Ranks of evidence, best first. */
  const RANKS = ["own", "literature", "unchecked", "statement", "similar", "none"];

  /** The entry of a map of records, and nothing that a map has of itself. @param {any} map @param {string} id */
  function at(map, id) {
    return Object.prototype.hasOwnProperty.call(map, id) ? map[id] : undefined;
  }

  /** @param {string} rank */
  function hasNumber(rank) {
    return rank === "own" || rank === "literature" || rank === "unchecked";
  }

  /** May a number of this rank support the word "holds"? @param {string} rank */
  function canHold(rank) {
    return rank === "own" || rank === "literature";
  }

  /** @param {string} one @param {string} other */
  function worstRank(one, other) {
    return RANKS.indexOf(one) >= RANKS.indexOf(other) ? one : other;
  }

  /** @template T @param {T[]} items @returns {T[]} */
  function distinct(items) {
    return Array.from(new Set(items));
  }

  /** @param {PublishedFact} row */
  function lowEnd(row, /** @type {number} */ quantile) {
    if (row.kind === "upper" || row.low === null) return 0;
    return row.low * Math.exp(-quantile * row.sigma);
  }

  /** @param {PublishedFact} row @returns {number | null} */
  function highEnd(row, /** @type {number} */ quantile) {
    if (row.kind === "lower" || row.high === null) return null;
    return row.kind === "upper" ? row.high : row.high * Math.exp(quantile * row.sigma);
  }

  /** @param {PublishedFact[]} rows @returns {number | null} */
  function geometricMiddle(rows) {
    let sum = 0;
    let count = 0;
    for (const row of rows) {
      if (row.kind !== "value" || !row.low || !row.high) continue;
      sum += (Math.log(row.low) + Math.log(row.high)) / 2;
      count += 1;
    }
    return count ? Math.exp(sum / count) : null;
  }

  /** The same fact twice counts once. @param {PublishedFact[]} rows */
  function distinctRows(rows) {
    const seen = new Map();
    for (const row of rows) {
      const key = [row.kind, row.low, row.high, row.sigma, row.tested_s].join("|");
      if (!seen.has(key)) seen.set(key, row);
    }
    return Array.from(seen.values());
  }

  /**
   * Envelope of published values, each widened by its own spread; rates in nm/s.
   * @param {PublishedFact[]} rows @param {number} quantile @param {number} untestedS
   * @returns {{band: Band, limitS: number | null} | null}
   */
  function envelope(rows, quantile, untestedS) {
    const values = distinctRows(rows);
    if (!values.length) return null;
    const highs = values.map((row) => highEnd(row, quantile));
    const high = highs.includes(null) ? null : Math.max(.../** @type {number[]} */ (highs));
    const low = Math.min(...values.map((row) => lowEnd(row, quantile)));
    return { band: { low: low, mid: geometricMiddle(values), high: high }, limitS: limitTime(values, untestedS) };
  }

  /**
   * A high end that is a printed limit holds only as long as somebody watched. Compared with values as printed,
   * not as widened: asking for more confidence must not lift the limit.
   * @param {PublishedFact[]} values @param {number} untestedS
   */
  function limitTime(values, untestedS) {
    const topOf = (/** @type {string} */ kind) => Math.max(0, ...values.filter((row) => row.kind === kind).map((row) => row.high || 0));
    const top = topOf("upper");
    const tested = values
      .filter((row) => row.kind === "upper" && row.high !== null && row.high === top)
      .map((row) => (row.tested_s === null ? untestedS : row.tested_s));
    return tested.length && top >= topOf("value") ? Math.min(...tested) : null;
  }

  /** Envelope of whole bands. @param {Band[]} bands @returns {Band} */
  function widest(bands) {
    const mids = bands.map((band) => band.mid);
    const allMids = mids.every((mid) => mid !== null && mid > 0);
    const highs = bands.map((band) => band.high);
    const logs = allMids ? mids.map((mid) => Math.log(/** @type {number} */ (mid))) : [];
    return {
      low: Math.min(...bands.map((band) => band.low)),
      mid: allMids ? Math.exp(logs.reduce((sum, log) => sum + log, 0) / logs.length) : null,
      high: highs.includes(null) ? null : Math.max(.../** @type {number[]} */ (highs)),
    };
  }

  ew.published = Object.freeze({ at, distinct, hasNumber, canHold, worstRank, envelope, widest });
})((globalThis.etchwright = globalThis.etchwright || {}));
