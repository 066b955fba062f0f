// @ts-check
/*
 * What is known of one film in one etch, at a temperature and a confidence: the best rank alone decides.
 * Twin of builder/findings/plan/evidence.py and builder/engine/conflict.py; the tests hold the two to the same
 * numbers. Pure: no document, no clock.
 */
(function (ew) {
  "use strict";

  const { at, distinct, envelope, widest, worstRank } = ew.published;
  const ADVERSE = new Set(["peels", "swells", "roughens", "cracks", "oxidises", "residue"]);
  /** Questions whose evidence is kept; beyond that all of it is found anew. */
  const MOST_ASKED = 8;

  /** @type {Evidence} */
  const NOTHING = Object.freeze({
    rank: "none", band: null, limitS: null, attacked: false, adverse: [], conflict: false, single: false,
    far: false, allTemperatures: false, hint: null, sources: [], words: [],
  });

  /**
   * Does a published row count at the temperature asked for? A row without a temperature counts only
   * when none is asked for, and when none is asked for every row counts.
   * @param {Facts} facts @param {Extent | null} stated @param {Extent | null} asked
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
    const recipe = etching.recipe;
    // "The same conditions" of a plasma include the temperature of the published rows.
    const isSame = recipe && recipe.inherits && (recipe.method === "plasma" || recipe.method === "cyclic");
    const temperature = asked.temperature || (recipe && !isSame ? recipe.temperature : null);
    const rows = rowsOf(etching, film.id);
    const counting = rows.filter((row) => matches(facts, row.temperature, temperature));
    const said = saidOf(facts, etching, film.id, temperature);
    const own = recipe ? at(recipe.own, film.id) : undefined;
    const far = recipe && own ? !wasRunAt(facts, own, recipe.temperature, asked.temperature) : false;
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

  /** @param {Facts} facts @param {Etching} etching @param {string} film @param {Extent | null} temperature @returns {SaidFact[]} */
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

  /** Runs without a temperature were made at the recipe's; if it states none, nobody knows at which. @param {Facts} facts @param {OwnFact} own @param {Extent | null} recipe @param {Extent | null} asked */
  function wasRunAt(facts, own, recipe, asked) {
    if (asked === null) return own.temperature === null || recipe === null || matches(facts, own.temperature, recipe);
    const ran = own.temperature || recipe;
    const near = facts.rules.temperature_match_k;
    return ran !== null && ran.low - near <= asked.low && asked.high <= ran.high + near;
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

  ew.evidence = Object.freeze({ at, distinct, worstRank, matches, evidence, familyMembers, hasNumber: ew.published.hasNumber, canHold: ew.published.canHold });
})((globalThis.etchwright = globalThis.etchwright || {}));
