// @ts-check
/*
 * What is known of one film in one etch, at a temperature and a confidence: the best rank alone decides.
 * Twin of builder/findings/plan/evidence.py and builder/engine/{evidence,conflict,rank}.py; the tests hold
 * the two to the same numbers. Pure: no document, no clock.
 */
(function (ew) {
  "use strict";

  /** Ranks of evidence, best first. */
  const RANKS = ["own", "literature", "unchecked", "statement", "similar", "none"];
  const ADVERSE = new Set(["peels", "swells", "roughens", "cracks", "oxidises", "residue"]);
  /** Conflicts are judged at this confidence whatever is asked, so that asking for more never hides one. */
  const MOST_ASKED = 8;

  /** @type {Evidence} */
  const NOTHING = Object.freeze({
    rank: "none", band: null, limitS: null, attacked: false, adverse: [], conflict: false, single: false,
    far: false, allTemperatures: false, hint: null, sources: [], words: [],
  });

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

  /**
   * Does a published row count at the temperature asked for? A row without a temperature counts only
   * when none is asked for, and when none is asked for every row counts.
   * @param {Facts} facts @param {Range | null} stated @param {Range | null} asked
   */
  function matches(facts, stated, asked) {
    if (asked === null) return true;
    if (stated === null) return false;
    const near = facts.rules.temperature_match_k;
    return stated.low <= asked.high + near && stated.high >= asked.low - near;
  }

  /** @param {OwnFact} own @param {number} confidence @returns {Band} */
  function atLevel(own, confidence) {
    const level = own.levels.find((one) => one.confidence === confidence);
    if (!level) throw new Error("no interval at a confidence of " + confidence);
    return { low: level.low, mid: level.mid, high: level.high };
  }

  /**
   * Evidence for a film, or the worst of its members' for a family.
   * @param {Facts} facts @param {Etching} etching @param {string} film @param {Asked} asked
   * @returns {Evidence}
   */
  function evidence(facts, etching, film, asked) {
    let known = etching.known.get(asked.key);
    if (!known) {
      if (etching.known.size >= MOST_ASKED) etching.known.clear();
      known = new Map();
      etching.known.set(asked.key, known);
    }
    let found = known.get(film);
    if (!found) {
      found = anew(facts, etching, facts.films[film], asked);
      known.set(film, found);
    }
    return found;
  }

  /** @param {Facts} facts @param {Etching} etching @param {FilmFacts} film @param {Asked} asked */
  function anew(facts, etching, film, asked) {
    if (!film.is_family) return ofFilm(facts, etching, film, asked);
    const members = familyMembers(facts, etching, film, asked);
    // What is said of the family itself is a hint for a member, but here the family is asked for.
    const said = saidOf(facts, etching, film.id, asked.temperature);
    if (said.some((fact) => fact.effect === "attacks")) members.push(fromStatements(said));
    return familyEvidence(members);
  }

  /** @param {Facts} facts @param {Etching} etching @param {FilmFacts} film @param {Asked} asked */
  function familyMembers(facts, etching, film, asked) {
    if (!film.is_family) return [ofFilm(facts, etching, film, asked)];
    return film.members.map((member) => ofFilm(facts, etching, facts.films[member], asked));
  }

  /** @param {Evidence[]} members @returns {Evidence} */
  function familyEvidence(members) {
    if (!members.length) return NOTHING;
    const bands = members.flatMap((member) => (member.band ? [member.band] : []));
    const limits = members.flatMap((member) => (member.limitS === null ? [] : [member.limitS]));
    return Object.assign({}, NOTHING, {
      rank: members.map((member) => member.rank).reduce(worstRank),
      band: bands.length === members.length ? widest(bands) : null,
      limitS: limits.length ? Math.min(...limits) : null,
      attacked: members.some((member) => member.attacked),
      adverse: distinct(members.flatMap((member) => member.adverse)),
      sources: distinct(members.flatMap((member) => member.sources)),
    });
  }

  /** @param {Facts} facts @param {Etching} etching @param {FilmFacts} film @param {Asked} asked @returns {Evidence} */
  function ofFilm(facts, etching, film, asked) {
    const temperature = asked.temperature || (etching.recipe ? etching.recipe.temperature : null);
    const rows = rowsOf(etching, film.id);
    const counting = rows.filter((row) => matches(facts, row.temperature, temperature));
    const said = saidOf(facts, etching, film.id, temperature);
    const own = etching.recipe ? at(etching.recipe.own, film.id) : undefined;
    const far = Boolean(own) && !wasRunAt(facts, own, asked.temperature);
    const best = bestPublished(facts, counting, asked.confidence);
    let base;
    if (own && !far) base = fromOwn(facts, own, best, counting, asked);
    else if (best) base = Object.assign({}, best, { far: far, allTemperatures: temperature === null && severalTemperatures(rows) });
    else if (said.length) base = Object.assign({}, fromStatements(said), { far: far });
    else return Object.assign({}, NOTHING, { far: far, hint: hintOf(facts, etching, film, rows) });
    return Object.assign({}, base, {
      adverse: distinct(said.filter((fact) => ADVERSE.has(fact.effect)).map((fact) => fact.effect)),
      attacked: said.some((fact) => fact.effect === "attacks"),
      words: said.map((fact) => fact.words),
    });
  }

  /** @param {PublishedFact[]} rows */
  function severalTemperatures(rows) {
    return new Set(rows.map((row) => (row.temperature ? row.temperature.low + ".." + row.temperature.high : ""))).size > 1;
  }

  /** Published numbers that count for an etching. @param {Etching} etching @param {string} film @returns {PublishedFact[]} */
  function rowsOf(etching, film) {
    const recipe = etching.recipe;
    if (recipe && !recipe.inherits) return [];
    const cycleS = recipe ? recipe.cycle_s : null;
    /** @type {PublishedFact[]} */
    const rows = [];
    for (const row of at(etching.etchant.rows, film) || []) {
      if (!row.per_cycle) rows.push(row);
      else if (cycleS !== null) {
        const low = row.low === null ? null : row.low / cycleS;
        const high = row.high === null ? null : row.high / cycleS;
        rows.push(Object.assign({}, row, { low: low, high: high, per_cycle: false }));
      }
    }
    return rows;
  }

  /** @param {Facts} facts @param {Etching} etching @param {string} film @param {Range | null} temperature @returns {SaidFact[]} */
  function saidOf(facts, etching, film, temperature) {
    const recipe = etching.recipe;
    const inherits = !recipe || recipe.inherits;
    // Under other conditions a harm is still a warning; that a film stood it is no comfort.
    const said = (at(etching.etchant.said, film) || []).filter(
      (/** @type {SaidFact} */ fact) =>
        (fact.temperature === null || matches(facts, fact.temperature, temperature)) &&
        (inherits || fact.effect !== "resists"),
    );
    const noCycle = !recipe || recipe.cycle_s === null;
    const rows = at(etching.etchant.rows, film) || [];
    if (noCycle && rows.some((/** @type {PublishedFact} */ row) => row.per_cycle && row.low)) {
      // A rate per cycle gives no time, but it says that the film goes.
      said.push({ effect: "attacks", words: "etched, at a rate per cycle", source: "", temperature: null });
    }
    return said;
  }

  /** @param {Facts} facts @param {OwnFact} own @param {Range | null} asked */
  function wasRunAt(facts, own, asked) {
    if (asked === null || own.temperature === null) return true;
    const near = facts.rules.temperature_match_k;
    return own.temperature.low - near <= asked.low && asked.high <= own.temperature.high + near;
  }

  /** @param {Facts} facts @param {PublishedFact[]} rows @param {number} confidence @returns {Evidence | null} */
  function bestPublished(facts, rows, confidence) {
    for (const rank of ["literature", "unchecked"]) {
      const ofRank = rows.filter((row) => row.rank === rank);
      if (!ofRank.length) continue;
      const limited = envelope(ofRank, ew.data.quantile(facts, confidence), facts.rules.untested_limit_s);
      if (!limited) continue;
      const sources = distinct(ofRank.map((row) => row.source));
      return Object.assign({}, NOTHING, { rank: rank, band: limited.band, limitS: limited.limitS, sources: sources });
    }
    return null;
  }

  /** @param {Facts} facts @param {OwnFact} own @param {Evidence | null} best @param {PublishedFact[]} rows @param {Asked} asked */
  function fromOwn(facts, own, best, rows, asked) {
    return Object.assign({}, NOTHING, {
      rank: "own",
      band: atLevel(own, asked.confidence),
      limitS: own.limit_s,
      conflict: best !== null && best.rank === "literature" && isConflict(facts, own, rows),
      single: own.runs + own.limits === 1,
    });
  }

  /** Own and published intervals with no point in common. @param {Facts} facts @param {OwnFact} own @param {PublishedFact[]} rows */
  function isConflict(facts, own, rows) {
    const confidence = facts.rules.reference_confidence;
    const published = bestPublished(facts, rows.filter((row) => row.rank === "literature"), confidence);
    if (!published || !published.band) return false;
    const level = atLevel(own, confidence);
    return liesBelow(level, published.band) || liesBelow(published.band, level);
  }

  /** @param {Band} first @param {Band} second */
  function liesBelow(first, second) {
    return first.high !== null && first.high < second.low;
  }

  /** @param {SaidFact[]} said @returns {Evidence} */
  function fromStatements(said) {
    return Object.assign({}, NOTHING, {
      rank: "statement",
      attacked: said.some((fact) => fact.effect === "attacks"),
      adverse: distinct(said.filter((fact) => ADVERSE.has(fact.effect)).map((fact) => fact.effect)),
      sources: distinct(said.filter((fact) => fact.source).map((fact) => fact.source)),
      words: said.map((fact) => fact.words),
    });
  }

  /** What is on record nearby; it decides nothing. @param {Facts} facts @param {Etching} etching @param {FilmFacts} film @param {PublishedFact[]} rows */
  function hintOf(facts, etching, film, rows) {
    if (rows.length) return "temperature";
    const etchant = etching.etchant;
    if (at(etchant.rows, film.id) || at(etchant.said, film.id)) return "conditions";
    for (const similar of film.similar) {
      const own = etching.recipe && at(etching.recipe.own, similar);
      if (own || at(etchant.rows, similar) || at(etchant.said, similar)) return "similar:" + similar;
    }
    for (const other of facts.families) {
      if (other.members.includes(film.id) && at(etchant.rows, other.id)) return "similar:" + other.id;
    }
    return null;
  }

  ew.evidence = Object.freeze({
    at, hasNumber, canHold, worstRank, envelope, widest, matches, evidence, familyMembers, distinct,
  });
})((globalThis.etchwright = globalThis.etchwright || {}));
