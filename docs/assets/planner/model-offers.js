// @ts-check
/*
 * Which etches are offered for a target and in which order, and why the others are left out.
 * Twin of builder/findings/plan/offers.py.
 */
(function (ew) {
  "use strict";

  /** Questions whose standing is kept; beyond that all of it is found anew. */
  const MOST_STANDING = 32;

  /** The options for a stage, best first, and what is left out. @param {Facts} facts @param {Stage} stage @param {Asked} asked @param {string | null} only */
  function offers(facts, stage, asked, only) {
    /** @type {Option[]} */
    const options = [];
    /** @type {Excluded[]} */
    const excluded = [];
    const standing = standingOf(facts, stage.target.film, asked);
    const films = filmsInOrder(stage.sample);
    facts.etchings.forEach(function (etching, place) {
      if (only !== null && /** @type {EtchFacts} */ (etching.recipe).id !== only) return;
      let against = standing[place];
      if (against === undefined) {
        against = leftOut(etching, reasonOfRecords(facts, etching, stage.target.film, asked));
        standing[place] = against;
      }
      if (against === null) against = leftOut(etching, reasonOfSample(facts, etching, stage.sample, films, asked));
      if (against) excluded.push(against);
      else options.push(ew.option.planOption(facts, etching, stage, asked));
    });
    return { options: options.sort(better), excluded: excluded };
  }

  /** Order of options: word, margin, proven here, lesser hazard, time; ids break a tie. @param {Option} one @param {Option} other */
  function better(one, other) {
    const order = ew.words.ORDER;
    return (
      order[one.verdict] - order[other.verdict] || Number(other.hasMargin) - Number(one.hasMargin) ||
      Number(other.proven) - Number(one.proven) || one.hazard - other.hazard || byTime(one, other) ||
      ew.couples.byCode(one.recipe || "", other.recipe || "") || ew.couples.byCode(one.etchant, other.etchant)
    );
  }

  /** @param {Option} one @param {Option} other */
  function byTime(one, other) {
    const first = one.schedule.latestStopS === null ? Infinity : one.schedule.latestStopS;
    const second = other.schedule.latestStopS === null ? Infinity : other.schedule.latestStopS;
    return first === second ? 0 : first - second;
  }

  /** What the records say against each etch for a film, whatever else the sample is; kept, and undefined until it is found. @param {Facts} facts @param {string} film @param {Asked} asked */
  function standingOf(facts, film, asked) {
    const key = asked.key + " " + film;
    let standing = facts.standing.get(key);
    if (!standing) {
      if (facts.standing.size >= MOST_STANDING) facts.standing.clear();
      standing = [];
      facts.standing.set(key, standing);
    }
    return standing;
  }

  /** @param {Etching} etching @param {Remark | null} reason @returns {Excluded | null} */
  function leftOut(etching, reason) {
    const recipe = /** @type {EtchFacts} */ (etching.recipe);
    return reason === null ? null : { recipe: recipe.id, etchant: recipe.etchant, reason: reason };
  }

  /** Every film of a sample, in an order that does not come from its list of others: the order of listing is no reason. @param {PlanSample} sample @returns {PlanFilm[]} */
  function filmsInOrder(sample) {
    const exposed = sample.exposed.slice().sort((/** @type {PlanFilm} */ one, /** @type {PlanFilm} */ other) => ew.couples.byCode(one.film, other.film));
    return [...sample.layers, ...exposed, ...(sample.back ? [sample.back] : [])];
  }

  /** The first reason that the records give to leave a recipe out, or null. @param {Facts} facts @param {Etching} etching @param {string} film @param {Asked} asked @returns {Remark | null} */
  function reasonOfRecords(facts, etching, film, asked) {
    const remark = ew.films.remark;
    const known = ew.evidence.evidence(facts, etching, film, asked);
    if (known.rank === "none" || known.rank === "similar") return remark("no-evidence", { film: film, hint: known.hint });
    const etches = known.attacked || (known.band !== null && (known.band.mid !== null || known.band.low > 0));
    if (!etches) return remark("does-not-etch", { film: film });
    return /** @type {EtchFacts} */ (etching.recipe).status === "retired" ? remark("retired") : null;
  }

  /** The first reason that the sample gives. @param {Facts} facts @param {Etching} etching @param {PlanSample} sample @param {PlanFilm[]} films @param {Asked} asked */
  function reasonOfSample(facts, etching, sample, films, asked) {
    return reasonOfTool(facts, etching, films) || reasonOfLimits(facts, etching, sample, asked) || reasonOfSafety(facts, etching, sample);
  }

  /** @param {Facts} facts @param {Etching} etching @param {PlanFilm[]} films @returns {Remark | null} */
  function reasonOfTool(facts, etching, films) {
    const refused = ew.evidence.at(facts.refused, /** @type {EtchFacts} */ (etching.recipe).tool);
    if (refused === undefined) return null;
    for (const film of films) {
      const words = ew.evidence.at(refused, film.film);
      if (words !== undefined) return ew.films.remark("tool-refuses", { film: film.film, words: words });
    }
    return null;
  }

  /** @param {Facts} facts @param {Etching} etching @param {PlanSample} sample @param {Asked} asked @returns {Remark | null} */
  function reasonOfLimits(facts, etching, sample, asked) {
    const remark = ew.films.remark;
    const recipe = /** @type {EtchFacts} */ (etching.recipe);
    if (sample.methods.length && !sample.methods.includes(recipe.method)) return remark("method", { method: recipe.method });
    if (sample.tools.length && !sample.tools.includes(recipe.tool)) return remark("tool", { tool: recipe.tool });
    if (sample.etchants.length && !sample.etchants.includes(recipe.etchant)) return remark("etchant", { etchant: recipe.etchant });
    const hot = recipe.temperature;
    if (hot && sample.hottestK !== null && hot.high > sample.hottestK) {
      return remark("too-hot", { recipe_k: hot.high, limit_k: sample.hottestK });
    }
    if (asked.temperature && hot && !ew.evidence.matches(facts, hot, asked.temperature)) {
      return remark("other-temperature", { recipe_k: hot.high, asked_k: asked.temperature.high });
    }
    return null;
  }

  /** @param {Facts} facts @param {Etching} etching @param {PlanSample} sample @returns {Remark | null} */
  function reasonOfSafety(facts, etching, sample) {
    const recipe = /** @type {EtchFacts} */ (etching.recipe);
    if (recipe.forbidden.length) return ew.films.remark("safety", { words: recipe.forbidden[0] });
    const fact = ew.option.gasFacts(facts, etching, sample).find((/** @type {GasFact} */ one) => one.forbidden);
    return fact ? ew.films.remark("safety", { words: fact.words }) : null;
  }

  ew.offers = Object.freeze({ offers });
})((globalThis.etchwright = globalThis.etchwright || {}));
