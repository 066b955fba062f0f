// @ts-check
/*
 * Films of different metals, or metal and semiconductor, wet at once: a battery that no rate table knows.
 * Twin of builder/findings/plan/couples.py.
 */
(function (ew) {
  "use strict";

  /** @type {{[effect: string]: number}} */
  const GRAVITY = { none: 0, undercut: 1, attacks: 2 };

  /** Couplings that are kept of one etchant; beyond that all of them are found anew. */
  const MOST_KEPT = 32;
  /** @type {Coupling} */
  const DRY = { caps: new Map(), lost: new Map(), planCaps: [], notes: [] };

  /** The couplings of an etch, found once for the same films in the same etchant: no rate and no time enters. @param {Reach} reach @param {Case[]} found @returns {Coupling} */
  function couplings(reach, found) {
    if (!reach.isWet) return DRY;
    const { couplings: known } = reach.facts;
    const films = filmsThatMeet(reach, found);
    let kept = known.get(reach.etching.etchant.id);
    if (!kept) known.set(reach.etching.etchant.id, (kept = []));
    const same = kept.find((one) => isSame(one.films, films));
    if (same) return same.coupling;
    const coupling = couplingsOf(reach, found);
    if (kept.length >= MOST_KEPT) kept.length = 0;
    kept.push({ films: films, coupling: coupling });
    return coupling;
  }

  /** All that couplings depend on beside the etchant. @param {Reach} reach @param {Case[]} found */
  function filmsThatMeet(reach, found) {
    const films = [reach.stage.target.film];
    for (const film of reach.stage.below) if (film.role === "target") films.push(film.film);
    for (const one of found) films.push(one.film.assumed ? "assumed" : "named", isSupposed(one) ? "supposed" : "there", one.film.film);
    return films;
  }

  /** @param {string[]} one @param {string[]} other */
  function isSame(one, other) {
    if (one.length !== other.length) return false;
    for (let place = 0; place < one.length; place += 1) if (one[place] !== other[place]) return false;
    return true;
  }

  /** @param {Reach} reach @param {Case[]} found @returns {Coupling} */
  function couplingsOf(reach, found) {
    /** @type {Coupling} */
    const result = { caps: new Map(), lost: new Map(), planCaps: [], notes: [] };
    const kept = new Set(found.map((one) => one.film.film));
    const laterTargets = reach.stage.below.filter((film) => film.role === "target").map((film) => film.film);
    const wet = ew.evidence.distinct([...kept, reach.stage.target.film, ...laterTargets]).sort(byCode);
    const supposed = supposedFilms(found);
    wet.forEach(function (/** @type {string} */ one, /** @type {number} */ place) {
      for (const other of wet.slice(place + 1)) {
        if (!isBattery(reach.facts, one, other) || (supposed.has(one) && supposed.has(other))) continue;
        const record = coupleOf(reach.facts, one, other, reach.etching.etchant.id);
        if (record) apply(record, [one, other], kept, result);
        else cap(ew.films.remark("couple", { one: one, other: other }), [one, other], kept, result);
      }
    });
    return result;
  }

  /** Adhesion layers that may lie under a noble metal: one or another of them, so never a pair. @param {Case[]} found */
  function supposedFilms(found) {
    const supposed = new Set(found.filter(isSupposed).map((one) => one.film.film));
    for (const one of found) if (!one.film.assumed) supposed.delete(one.film.film);
    return supposed;
  }

  /** @param {Case} one */
  function isSupposed(one) {
    return one.caps.some((cap) => cap.code === "under-noble");
  }

  /** Order of plain ids, the same in both languages. @param {string} one @param {string} other */
  function byCode(one, other) {
    return one < other ? -1 : one > other ? 1 : 0;
  }

  /** The record of two films in an etchant; the gravest of several. @param {Facts} facts @param {string} one @param {string} other @param {string} etchant @returns {CoupleFact | null} */
  function coupleOf(facts, one, other, etchant) {
    let found = null;
    for (const couple of facts.couples) {
      const isPair = couple.films.includes(one) && couple.films.includes(other);
      if (!isPair || new Set(couple.films).size !== 2 || !couple.etchants.includes(etchant)) continue;
      if (!found || GRAVITY[couple.effect] > GRAVITY[found.effect]) found = couple;
    }
    return found;
  }

  /** @param {Facts} facts @param {string} one @param {string} other */
  function isBattery(facts, one, other) {
    const kinds = [facts.films[one].electrical, facts.films[other].electrical];
    if (kinds.includes("insulator")) return false;
    // A film whose nature nobody stated may be a metal: only a pair of two semiconductors is harmless.
    return kinds.some((kind) => kind !== "semiconductor");
  }

  /** @param {CoupleFact} record @param {string[]} pair @param {Set<string>} kept @param {Coupling} result */
  function apply(record, pair, kept, result) {
    if (record.effect === "none") return;
    const values = { one: pair[0], other: pair[1], words: record.words, source: record.source };
    const affected = record.affects ? [record.affects] : pair;
    for (const film of affected) {
      if (!kept.has(film)) result.notes.push(ew.films.remark("couple-target", values));
      else if (record.effect === "attacks") result.lost.set(film, ew.films.remark("couple", values));
      else addCap(result, film, ew.films.remark("couple-undercut", values));
    }
    if (!affected.some((film) => kept.has(film))) cap(ew.films.remark("couple-undercut", values), pair, kept, result);
  }

  /** A cap on those of a pair that stay, or on the plan where neither does. @param {Remark} remark @param {string[]} pair @param {Set<string>} kept @param {Coupling} result */
  function cap(remark, pair, kept, result) {
    const touched = pair.filter((film) => kept.has(film));
    for (const film of touched) addCap(result, film, remark);
    if (!touched.length) result.planCaps.push(remark);
  }

  /** @param {Coupling} result @param {string} film @param {Remark} remark */
  function addCap(result, film, remark) {
    const caps = result.caps.get(film);
    if (caps) caps.push(remark);
    else result.caps.set(film, [remark]);
  }

  ew.couples = Object.freeze({ couplings, byCode });
})((globalThis.etchwright = globalThis.etchwright || {}));
