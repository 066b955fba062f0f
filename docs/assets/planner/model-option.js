// @ts-check
/*
 * One etch for one target on one sample: its times, every film's word, and what a reader must know beside.
 * Twin of builder/findings/plan/option.py.
 */
(function (ew) {
  "use strict";

  /** @param {Facts} facts @param {Etching} etching @param {Stage} stage @param {Asked} asked @returns {Option} */
  function planOption(facts, etching, stage, asked) {
    const known = ew.evidence.evidence(facts, etching, stage.target.film, asked);
    const timing = timingOf(facts, etching, stage, known);
    const reach = ew.films.reaching(facts, etching, asked, stage, timing);
    const [undercut, undercutByLook] = undercuts(reach);
    const found = ew.films.cases(reach);
    const couples = ew.couples.couplings(reach, found);
    const caps = [...ew.planCaps.planCaps(reach, known), ...couples.planCaps];
    const plan = { targetRank: known.rank, caps: caps, undercut: undercut, undercutByLook: undercutByLook };
    const rows = judgedRows(reach, found, plan, couples);
    const best = bestWord(known.rank, caps, timing.schedule);
    const verdict = worstOf(rows, best, "verdict");
    const recipe = etching.recipe;
    const through = isThrough(stage.sample, stage.target);
    /** @type {Remark[] | null} */
    let noted = null;
    /** @type {Remark[] | null} */
    let missing = null;
    return {
      recipe: recipe ? recipe.id : null, etchant: etching.etchant.id, method: reach.method, verdict: verdict,
      verdictByLook: worstOf(rows, best, "verdictByLook"), target: stage.target.film, targetRank: known.rank,
      targetBand: known.band, targetSources: known.sources, schedule: timing.schedule,
      mode: ew.times.endMode(facts, timing.schedule, verdict === "holds", Boolean(recipe && recipe.endpoint)),
      undercut: undercut, undercutByLook: undercutByLook, rows: rows, planCaps: caps,
      // What only the options that are looked at need is made when it is first asked for.
      get notes() {
        return noted || (noted = ew.judging.distinctRemarks([...notes(reach, known), ...couples.notes]));
      },
      get unstated() {
        return missing || (missing = ew.judging.distinctRemarks(unstated(reach, rows)));
      },
      proven: Boolean(recipe && recipe.status === "proven" && known.rank === "own"),
      hazard: etching.etchant.hazard, hasMargin: hasMargin(facts, rows),
      phi: timing.cut.phi, offsetS: timing.cut.offsetS, overetch: timing.cut.overetch,
      later: laterOf(reach),
      bares: through && stage.below.length ? stage.below[0].film : null,
    };
  }

  /** The word before any film has spoken. @param {string} rank @param {Remark[]} caps @param {Schedule} schedule */
  function bestWord(rank, caps, schedule) {
    if (schedule.latestStopS === null) return "unmeasured";
    return ew.evidence.canHold(rank) && !caps.length ? "holds" : "borderline";
  }

  /** @param {Reach} reach @param {Case[]} found @param {PlanCaps} plan @param {Coupling} couples */
  function judgedRows(reach, found, plan, couples) {
    return orderedRows(
      found.map((one) =>
        ew.judging.judge(reach, one, plan, couples.caps.get(one.film.film) || [], couples.lost.get(one.film.film) || null),
      ),
    );
  }

  /** @param {FilmRow[]} rows @param {string} best @param {"verdict" | "verdictByLook"} which */
  function worstOf(rows, best, which) {
    return rows.reduce((worst, row) => ew.words.worse(worst, row[which]), best);
  }

  /** When the target clears, with what fixes it. @param {Facts} facts @param {Etching} etching @param {Stage} stage @param {Evidence} known @returns {Timing} */
  function timingOf(facts, etching, stage, known) {
    const { recipe } = etching;
    const target = stage.target;
    const depth = ew.sample.depthIn(stage.sample, target);
    const through = isThrough(stage.sample, target);
    const [left, tolerance] = leftOf(target);
    // Half of what may be left is no likely thickness, so no time is likely either.
    const band = target.spentNm === null && known.band ? Object.assign({}, known.band, { mid: null }) : known.band;
    /** @type {Cut} */
    const cut = {
      depthNm: through || depth === null ? left : depth, thicknessNm: left, tolerance: tolerance,
      phi: phiOf(facts, etching), offsetS: recipe ? recipe.offset_s : 0, overetch: recipe ? recipe.overetch : 0,
      reactionS: reactionOf(facts, etching), through: through,
    };
    return { band: band, cut: cut, schedule: ew.times.schedule(facts, band, cut) };
  }

  /** Is the whole target removed? @param {PlanSample} sample @param {PlanFilm} target */
  function isThrough(sample, target) {
    const depth = ew.sample.depthIn(sample, target);
    return depth === null || depth >= target.thicknessNm;
  }

  /** The middle of what is left of a target, nm, and the half-width around it as a fraction. @param {PlanFilm} target @returns {[number, number]} */
  function leftOf(target) {
    if (target.spentNm === 0) return [target.thicknessNm, target.tolerance];
    const most = target.thicknessNm * (1 + target.tolerance);
    const least = target.spentNm === null ? 0 : Math.max(0, target.thicknessNm * (1 - target.tolerance) - target.spentNm);
    return [(most + least) / 2, (most - least) / (most + least)];
  }

  /** What the etch takes at worst of targets that a later stage removes. @param {Reach} reach @returns {LaterTarget[]} */
  function laterOf(reach) {
    return ew.films.laterTargets(reach).map((/** @type {Case} */ one) => {
      const band = ew.films.known(reach, one.film.film).band;
      const lost = ew.times.loss(band, one.byTimer, reach.timing.cut.phi, 1);
      return { film: one.film.film, thicknessNm: one.film.thicknessNm, lossNm: lost.high };
    });
  }

  /** Non-uniformity: the recipe's, else the lab's default for its method. @param {Facts} facts @param {Etching} etching @returns {number} */
  function phiOf(facts, etching) {
    if (etching.recipe) return etching.recipe.phi;
    const { method, gas_bubbles: bubbles } = etching.etchant;
    const defaults = facts.defaults;
    if (method === "plasma") return defaults.phi_plasma;
    if (method === "cyclic") return defaults.phi_cyclic;
    if (method === "vapour") return defaults.phi_vapour;
    return bubbles ? defaults.phi_bubbles : defaults.phi_immersion;
  }

  /** @param {Facts} facts @param {Etching} etching @returns {number} */
  function reactionOf(facts, etching) {
    return etching.etchant.state === "plasma" ? facts.defaults.reaction_plasma_s : facts.defaults.reaction_wet_s;
  }

  /** The way of one mask edge, nm, by timer and by look. @param {Reach} reach @returns {[Span, Span]} */
  function undercuts(reach) {
    const { timing } = reach;
    const band = ew.times.scaled(timing.band, ratioOf(reach));
    const way = (/** @type {Exposure | null} */ exposure) =>
      ew.times.loss(band, ew.times.withoutOffset(exposure, timing.cut.offsetS), timing.cut.phi, 1);
    return [way(ew.times.openByTimer(timing.schedule)), way(ew.times.openByLook(timing.schedule, timing.cut))];
  }

  /** @param {Reach} reach */
  function isIsotropic(reach) {
    return reach.etching.recipe ? reach.etching.recipe.isotropic : reach.etching.etchant.isotropic;
  }

  /** @param {Reach} reach @returns {Span} */
  function ratioOf(reach) {
    const recipe = reach.etching.recipe;
    if (reach.method === "lift-off") return ew.times.UNKNOWN_SPAN;
    if (recipe && recipe.ratio) return recipe.ratio;
    const assumed = reach.facts.rules.isotropic_undercut;
    return isIsotropic(reach) ? { low: assumed, mid: assumed, high: assumed } : ew.times.UNKNOWN_SPAN;
  }

  /** @param {Reach} reach @param {Evidence} known @returns {Remark[]} */
  function notes(reach, known) {
    const remark = ew.films.remark;
    const { recipe, etchant } = reach.etching;
    const found = [];
    if (recipe) {
      const film = reach.stage.target.film;
      if (!recipe.targets.includes(film)) found.push(remark("not-a-target", { film: film }));
      if (recipe.status === "draft") found.push(remark("draft"));
      found.push(...timeNotes(reach));
    }
    if (known.conflict) found.push(remark("conflict"));
    if (known.far) found.push(remark("far"));
    const own = ew.planCaps.ownOfTarget(reach);
    if (known.rank === "own" && own && own.stale_days !== null) {
      found.push(remark("stale", { film: reach.stage.target.film, days: own.stale_days }));
    }
    if (known.allTemperatures) found.push(remark("all-temperatures"));
    const noRatio = !recipe || recipe.ratio === null;
    if (isIsotropic(reach) && noRatio && ew.films.masksOf(reach.stage).length) found.push(remark("undercut-assumed"));
    for (const fact of gasFacts(reach.facts, reach.etching, reach.stage.sample)) found.push(remark("gas", { words: fact.words }));
    const cautions = [...(recipe ? recipe.cautions : []), ...etchant.cautions];
    return [...found, ...cautions.map((words) => remark("hazard", { words: words }))];
  }

  /** A time far from those of the runs, where no depth series shows that the rate stays. @param {Reach} reach @returns {Remark[]} */
  function timeNotes(reach) {
    const own = ew.planCaps.ownOfTarget(reach);
    const stop = reach.timing.schedule.latestStopS;
    if (!own || stop === null || own.induction_s !== null || !ew.planCaps.isOutsideRuns(reach.facts, stop, own.times)) return [];
    return [ew.films.remark("time-outside-runs", { stop_s: stop, low_s: own.times.low, high_s: own.times.high })];
  }

  /**
   * What the etchant, the films it reaches and the bond do to a person, forbidden ones first.
   * @param {Facts} facts @param {Etching} etching @param {PlanSample} sample @returns {GasFact[]}
   */
  function gasFacts(facts, etching, sample) {
    const { recipe, etchant } = etching;
    const own = recipe ? recipe.gas : etchant.alone;
    const at = ew.evidence.at;
    /** @type {GasFact[]} */
    const found = [];
    const add = (/** @type {PlanFilm} */ film, /** @type {GasFact[] | undefined} */ given) => {
      if (given) for (const fact of given) if (fact.from_nm === 0 || film.thicknessNm > fact.from_nm) found.push(fact);
    };
    for (const film of filmsOf(sample)) {
      add(film, at(own, film.film));
      add(film, at(etchant.gas, film.film));
    }
    if (sample.bond !== null && facts.bondPattern && facts.bondPattern.test(sample.bond)) found.push(...etchant.bond);
    if (found.length < 2) return found;
    const unique = new Map(found.map((fact) => [fact.forbidden + "|" + fact.from_nm + "|" + fact.words, fact]));
    return Array.from(unique.values()).sort(
      (one, other) => Number(other.forbidden) - Number(one.forbidden) || ew.couples.byCode(one.words, other.words),
    );
  }

  /** @param {PlanSample} sample */
  function filmsOf(sample) {
    return [...sample.layers, ...sample.exposed, ...(sample.back ? [sample.back] : [])];
  }

  /** What the sample does not say and a better answer needs. @param {Reach} reach @param {FilmRow[]} rows @returns {Remark[]} */
  function unstated(reach, rows) {
    const remark = ew.films.remark;
    const { sample, below } = reach.stage;
    const found = [];
    if (reach.reachesBack && sample.back === null && !sample.backProtected) found.push(remark("back"));
    if (reach.reachesBack && sample.edge === null && rows.some((row) => row.role === "under")) found.push(remark("edge"));
    for (const row of rows) {
      for (const cap of row.caps) {
        if (cap.code === "under-noble") found.push(remark("under-noble", { film: cap.params.film }));
      }
      // What an earlier step took is not known there, and no allowance would help.
      if (row.allowedNm === null && !row.assumed && row.spentNm !== null) found.push(remark("allowed", { film: row.film }));
    }
    const recipe = reach.etching.recipe;
    if (reach.asked.temperature === null && (!recipe || recipe.temperature === null)) found.push(remark("temperature"));
    if (sample.lineNm === null && ew.films.masksOf(reach.stage).length && isIsotropic(reach)) found.push(remark("line"));
    if (sample.loadCm2 === null && reach.etching.etchant.state === "plasma") found.push(remark("load"));
    if (sample.windowNm === null && ew.planCaps.windowsOfRuns(reach) !== null) found.push(remark("window"));
    if (sample.throughWafer && sample.carrier === null && !below.length) found.push(remark("stop"));
    return found;
  }

  /** How much of what a film may lose goes at worst, by timer or by look; unknown counts as all. @param {FilmRow} row */
  function shareUsed(row) {
    if (row.allowedNm === Infinity) return -1;
    const highs = [row.loss.high, row.lossByLook.high];
    if (!row.allowedNm || highs.includes(null)) return Infinity;
    // To nine digits: the last bits of exp and log are the platform's, and must not decide an order.
    return Number((Math.max(.../** @type {number[]} */ (highs)) / row.allowedNm).toPrecision(9));
  }

  /** Worst first, then closest to its limit; of the layers that may lie under one noble metal, the worst. @param {FilmRow[]} rows */
  function orderedRows(rows) {
    const shares = new Map(rows.map((row) => [row, shareUsed(row)]));
    const shareOf = (/** @type {FilmRow} */ row) => Number(shares.get(row));
    const byShare = (/** @type {FilmRow} */ one, /** @type {FilmRow} */ other) => Number(shareOf(one) < shareOf(other)) - Number(shareOf(one) > shareOf(other));
    const order = ew.words.ORDER;
    const byCode = ew.couples.byCode;
    const ordered = rows.sort(
      (one, other) =>
        order[other.verdict] - order[one.verdict] || order[other.verdictByLook] - order[one.verdictByLook] ||
        byShare(one, other) || byCode(one.role, other.role) || byCode(one.film, other.film) || one.thicknessNm - other.thicknessNm ||
        // No two rows change places because they were listed so.
        byCode(JSON.stringify(one), JSON.stringify(other)),
    );
    const noble = new Set();
    return ordered.filter(function (row) {
      const cap = row.caps.find((one) => one.code === "under-noble");
      if (!cap) return true;
      if (noble.has(cap.params.film)) return false;
      noble.add(cap.params.film);
      return true;
    });
  }

  /** May every film lose at least twice what it loses at worst? @param {Facts} facts @param {FilmRow[]} rows */
  function hasMargin(facts, rows) {
    return rows.every(
      (row) =>
        row.allowedNm !== null && row.loss.high !== null &&
        (row.allowedNm === Infinity || row.allowedNm >= facts.rules.good_margin * row.loss.high),
    );
  }

  ew.option = Object.freeze({ planOption, phiOf, reactionOf, gasFacts, unstated, judgedRows, worstOf, filmsOf, isThrough });
})((globalThis.etchwright = globalThis.etchwright || {}));
