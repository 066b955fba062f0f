// @ts-check
/*
 * A sample as a plan sees it: films with thickness in nm, in the stage that is being planned.
 * Twin of builder/findings/plan/sample.py.
 */
(function (ew) {
  "use strict";

  const DIGITS = 12;
  const ROOM = "room";

  /** A number to 12 digits: the unit it was written in must leave no trace. @param {number} value */
  function rounded(value) {
    return Number(value.toPrecision(DIGITS));
  }

  /** The number that a checked text states. @param {Facts} facts @param {any} text @param {string} dimension @returns {number | null} */
  function number(facts, text, dimension) {
    if (text === undefined || text === null) return null;
    return rounded(ew.units.parse(facts.units, text, dimension).value);
  }

  /** @param {Facts} facts @param {any} text @returns {Extent | null} */
  function temperature(facts, text) {
    if (text === undefined || text === null) return null;
    if (text === ROOM) return { low: rounded(facts.rules.room_temperature_k[0]), high: rounded(facts.rules.room_temperature_k[1]) };
    const found = ew.units.parse(facts.units, text, "temperature");
    if (found.form === "value") return { low: rounded(found.value), high: rounded(found.value) };
    return found.form === "range" ? { low: rounded(found.low), high: rounded(found.high) } : null;
  }

  /** The thickness of a film of a checked sample file, nm. @param {Facts} facts @param {any} film @returns {number} */
  function thicknessNm(facts, film) {
    return rounded(ew.units.parse(facts.units, film.thickness, "length").value);
  }

  /** A film of a sample file that has passed its check. @param {Facts} facts @param {any} film @param {string} role @returns {PlanFilm} */
  function planFilm(facts, film, role) {
    const found = ew.units.parse(facts.units, film.thickness, "length");
    const thickness = thicknessNm(facts, film);
    const half = found.halfWidth;
    const stated = film.allowed_loss;
    return {
      film: film.film, thicknessNm: thickness, role: role,
      tolerance: half === null ? facts.defaults.tolerance : rounded(rounded(half) / thickness),
      allowedNm: stated === "any" ? Infinity : number(facts, stated, "length"),
      on: film.on === undefined ? null : film.on, isCritical: film.surface === "critical",
      exposed: film.exposed || "face", spentNm: 0, assumed: false,
    };
  }

  /** A checked sample file as a plan sees it. @param {Facts} facts @param {any} file @returns {PlanSample} */
  function planSample(facts, file) {
    const goal = file.goal || {};
    const limits = file.limits || {};
    const mount = file.mount || {};
    const hottest = temperature(facts, limits.temperature);
    const isDepth = goal.depth !== undefined && goal.depth !== "through" && goal.depth !== "through-wafer";
    const back = file.back;
    return {
      name: file.sample || "", layers: file.layers.map((/** @type {any} */ one) => planFilm(facts, one, one.role)),
      exposed: (file.also_exposed || []).map((/** @type {any} */ one) => planFilm(facts, one, "exposed")),
      back: back && back !== "protected" ? planFilm(facts, back, "back") : null, backProtected: back === "protected",
      edge: file.edge || null, depthNm: isDepth ? number(facts, goal.depth, "length") : null,
      throughWafer: goal.depth === "through-wafer", lineNm: number(facts, goal.line, "length"),
      windowNm: number(facts, goal.window, "length"),
      loadCm2: goal.load_cm2 === undefined ? null : goal.load_cm2, methods: limits.methods || [],
      tools: limits.tools || [], etchants: limits.etchants || [], hottestK: hottest ? hottest.high : null,
      carrier: mount.carrier === undefined ? null : mount.carrier, bond: mount.bond === undefined ? null : mount.bond,
      temperature: temperature(facts, file.temperature),
    };
  }

  /** The steps of a checked sample file. @param {Facts} facts @param {any} file @returns {PlanStep[]} */
  function planSteps(facts, file) {
    return (file.steps || []).map((/** @type {any} */ step) => ({
      treat: step.treat || null, etch: step.etch || null, etchant: step.etchant || null,
      timeS: step.time === undefined ? null : number(facts, step.time, "time"),
      temperature: temperature(facts, step.temperature),
    }));
  }

  /** One stage a target, in the order in which the layers are reached. @param {PlanSample} sample @returns {Stage[]} */
  function stagesOf(sample) {
    return sample.layers.flatMap((film, place) =>
      film.role === "target" && isReached(sample, film)
        ? [{ sample: sample, target: film, above: sample.layers.slice(0, place).reverse(), below: sample.layers.slice(place + 1) }]
        : [],
    );
  }

  /** How deep to go into a target, nm: the depth asked for less the targets above; null: through. @param {PlanSample} sample @param {PlanFilm} target @returns {number | null} */
  function depthIn(sample, target) {
    if (sample.depthNm === null) return null;
    const above = sample.layers.slice(0, sample.layers.indexOf(target)).filter((film) => film.role === "target");
    return rounded(sample.depthNm - above.reduce((sum, film) => sum + film.thicknessNm, 0));
  }

  /** Does the depth asked for go into a target at all? @param {PlanSample} sample @param {PlanFilm} target */
  function isReached(sample, target) {
    const depth = depthIn(sample, target);
    return depth === null || depth > 0;
  }

  /** A film after a step that took at worst `lossNm` (null: nobody knows how much). @param {PlanFilm} film @param {number | null} lossNm */
  function worn(film, lossNm) {
    const spent = lossNm === null || film.spentNm === null ? null : film.spentNm + lossNm;
    return ew.films.changed(film, { spentNm: spent });
  }

  /** A sample as the best option leaves it: each film with its worst loss. @param {PlanSample} sample @param {Option | null} option @returns {PlanSample} */
  function wornSample(sample, option) {
    const bottom = sample.layers[sample.layers.length - 1];
    const after = (/** @type {PlanFilm} */ film) => {
      if (option === null) return worn(film, null);
      const losses = lossesOf(option, film, film === bottom);
      if (!losses.length) return film;
      if (film.allowedNm === Infinity && losses.includes(null)) return worn(film, Infinity);
      return worn(film, losses.includes(null) ? null : Math.max(.../** @type {number[]} */ (losses)));
    };
    return Object.assign({}, sample, {
      layers: sample.layers.map(after), exposed: sample.exposed.map(after), back: sample.back ? after(sample.back) : null,
    });
  }

  /**
   * Every worst loss on record of a film: the bottom layer loses at the back too. A target that is not yet removed
   * is eaten in the windows, by a treatment or another target's overetch; afterwards at the edges it was cut to.
   * @param {Option} option @param {PlanFilm} film @param {boolean} isBottom @returns {(number | null)[]}
   */
  function lossesOf(option, film, isBottom) {
    const isTarget = film.role === "target";
    const roles = [...(isTarget ? ["under", "exposed"] : [film.role]), ...(isBottom ? ["back"] : [])];
    const isIt = (/** @type {{film: string, thicknessNm: number}} */ one) => one.film === film.film && one.thicknessNm === film.thicknessNm;
    const rows = option.rows.filter((row) => isIt(row) && roles.includes(row.role) && !(row.assumed && row.role === "back"));
    const later = isTarget ? option.later.filter(isIt) : [];
    return [...rows.map((row) => row.loss.high), ...later.map((one) => one.lossNm)];
  }

  /** What is left of a target has fresh edges: what its open face had lost went with it. @param {PlanSample} sample @param {number} removed @returns {PlanSample} */
  function cut(sample, removed) {
    const target = stagesOf(sample)[removed].target;
    const layers = sample.layers.map((film) => (film === target ? ew.films.changed(film, { spentNm: 0 }) : film));
    return Object.assign({}, sample, { layers: layers });
  }

  /** A strip leaves no resist; what is left of the targets under it then lies open. @param {Facts} facts @param {PlanSample} sample @param {number} removed @returns {PlanSample} */
  function stripped(facts, sample, removed) {
    const layers = sample.layers.filter((film) => film.role !== "mask" || !ew.films.ORGANIC.has(facts.films[film.film].family));
    if (layers.length === sample.layers.length || layers.some((film) => film.role === "mask")) return Object.assign({}, sample, { layers: layers });
    const bared = stagesOf(sample).slice(0, removed).map((stage) => ew.films.changed(stage.target, { role: "exposed" }));
    return Object.assign({}, sample, { layers: layers, exposed: [...sample.exposed, ...bared] });
  }

  ew.sample = Object.freeze({ planSample, planSteps, stagesOf, depthIn, wornSample, cut, stripped, rounded, thicknessNm });
})((globalThis.etchwright = globalThis.etchwright || {}));
