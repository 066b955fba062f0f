// @ts-check
/*
 * What keeps a whole plan from the word "holds", whatever its films: conditions that no run has seen.
 * Twin of builder/findings/plan/caps_of_plan.py.
 */
(function (ew) {
  "use strict";

  /** The caps of a plan as a whole, but for those of couples; `known` is the target's evidence. @param {Reach} reach @param {Evidence} known @returns {Remark[]} */
  function planCaps(reach, known) {
    const remark = ew.films.remark;
    const { sample, target, below } = reach.stage;
    const caps = [];
    if (known.conflict && known.single) caps.push(remark("conflict"));
    if (sample.throughWafer && sample.carrier === null && !below.length) caps.push(remark("through-wafer"));
    caps.push(...loadCap(reach), ...windowCap(reach), ...heatCap(reach));
    if (reach.facts.films[target.film].is_family) caps.push(remark("family"));
    return caps;
  }

  /** Openings of the target's own runs, nm, where their width changes the rate: gas gets in and out of a narrow one more slowly. @param {Reach} reach @returns {Extent | null} */
  function windowsOfRuns(reach) {
    const own = ownOfTarget(reach);
    return own && !reach.isWet ? own.window_nm : null;
  }

  /** @param {Reach} reach */
  function ownOfTarget(reach) {
    const recipe = reach.etching.recipe;
    return recipe ? ew.evidence.at(recipe.own, reach.stage.target.film) : undefined;
  }

  /** @param {Facts} facts @param {number} value @param {Extent} runs */
  function isOutsideRuns(facts, value, runs) {
    const [least, most] = facts.rules.run_span;
    return !(least * runs.low <= value && value <= most * runs.high);
  }

  /** @param {Reach} reach @returns {Remark[]} */
  function loadCap(reach) {
    const { sample, target } = reach.stage;
    const own = ownOfTarget(reach);
    const loads = own ? own.load_cm2 : null;
    if (loads && sample.loadCm2 !== null) {
      if (!isOutsideRuns(reach.facts, sample.loadCm2, loads)) return [];
      return [ew.films.remark("load", { load_cm2: sample.loadCm2, low_cm2: loads.low, high_cm2: loads.high })];
    }
    // A carrier of the target's own film eats most of the etchant: no run says how fast the piece goes.
    const isEater = sample.loadCm2 === null && sample.carrier === target.film && !reach.isWet;
    return isEater ? [ew.films.remark("carrier-load", { film: sample.carrier })] : [];
  }

  /** @param {Reach} reach @returns {Remark[]} */
  function windowCap(reach) {
    const window = reach.stage.sample.windowNm;
    const runs = windowsOfRuns(reach);
    if (window === null || runs === null || !isOutsideRuns(reach.facts, window, runs)) return [];
    return [ew.films.remark("window", { window_nm: window, low_nm: runs.low, high_nm: runs.high })];
  }

  /** A limit on heat means something only for an etch whose temperature is known to be below it. @param {Reach} reach @returns {Remark[]} */
  function heatCap(reach) {
    const limit = reach.stage.sample.hottestK;
    const at = (reach.etching.recipe && reach.etching.recipe.temperature) || reach.asked.temperature;
    if (limit === null || (at && at.high <= limit)) return [];
    return [ew.films.remark("heat-limit", { limit_k: limit, at_k: at ? at.high : null })];
  }

  ew.planCaps = Object.freeze({ planCaps, windowsOfRuns, ownOfTarget, isOutsideRuns });
})((globalThis.etchwright = globalThis.etchwright || {}));
