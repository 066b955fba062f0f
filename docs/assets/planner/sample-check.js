// @ts-check
/*
 * What is wrong or missing in a sample that is being built, field by field, all at once. Follows
 * builder/checking/rules_samples.py and schemas/samples.schema.json.
 */
(function (ew) {
  "use strict";

  /** @typedef {{field: string, words: string}} SampleProblem `field` is the place in the file, `layers/0/film` */
  /** @typedef {{facts: Facts, problems: SampleProblem[]}} Checking */

  /** @param {Checking} c @param {string} field @param {string} words */
  function report(c, field, words) {
    c.problems.push({ field: field, words: words });
  }

  /** A single quantity, or null with a problem reported. @param {Checking} c @param {string} field @param {any} text @param {string} dimension @param {boolean} positive @returns {Quantity | null} */
  function quantity(c, field, text, dimension, positive) {
    try {
      const found = ew.units.parse(c.facts.units, String(text), dimension);
      if (found.form === "value" && !(positive && found.value === 0)) return found;
      report(c, field, found.form === "value" ? '"' + text + '" must be more than zero' : '"' + text + '": give a single number with its unit');
    } catch (error) {
      if (!(error instanceof ew.units.QuantityError)) throw error;
      report(c, field, /** @type {Error} */ (error).message);
    }
    return null;
  }

  /** Of an etch or a treatment, which may be at room temperature. @param {Checking} c @param {string} field @param {any} text */
  function etchTemperature(c, field, text) {
    if (text !== "room") temperature(c, field, text);
  }

  /** @param {Checking} c @param {string} field @param {any} text */
  function temperature(c, field, text) {
    if (text !== undefined) quantity(c, field, text, "temperature", false);
  }

  /** @param {Checking} c @param {string} field @param {any} film */
  function filmName(c, field, film) {
    if (!film) return report(c, field, "name the film");
    if (!ew.evidence.at(c.facts.films, film)) report(c, field, noFilm(c, film));
  }

  /** @param {Checking} c @param {any} film */
  function noFilm(c, film) {
    return ew.names.unknownWords(ew.names.entriesOf(c.facts).films, "film", String(film));
  }

  /** @param {Checking} c @param {any} etchant */
  function noEtchant(c, etchant) {
    return ew.names.unknownWords(ew.names.entriesOf(c.facts).etchants, "etchant", String(etchant));
  }

  /** One film; returns its thickness in nm, or null. @param {Checking} c @param {string} field @param {any} film */
  function film(c, field, film) {
    filmName(c, field + "/film", film.film);
    if (!film.thickness) report(c, field + "/thickness", "give the thickness, with its unit");
    const found = film.thickness ? quantity(c, field + "/thickness", film.thickness, "length", true) : null;
    const thickness = found ? found.value : null;
    if (found && found.halfWidth !== null && found.halfWidth >= /** @type {number} */ (thickness)) {
      report(c, field + "/thickness", "the tolerance is not smaller than the thickness");
    }
    if (film.allowed_loss !== undefined && film.allowed_loss !== "any") {
      const allowed = quantity(c, field + "/allowed_loss", film.allowed_loss, "length", false);
      if (allowed && thickness !== null && /** @type {number} */ (allowed.value) > thickness) {
        report(c, field + "/allowed_loss", 'more than the whole film; write "any" if it may vanish');
      }
    }
    if (film.on !== undefined && film.on !== "none" && !ew.evidence.at(c.facts.films, film.on)) {
      report(c, field + "/on", noFilm(c, film.on));
    }
    return thickness === null || !found ? null : thickness + (found.halfWidth || 0);
  }

  /** Layers stand top first: masks, then targets, then what is kept. @param {Checking} c @param {any[]} layers */
  function order(c, layers) {
    if (!layers.some((layer) => layer.role === "target")) report(c, "layers", "say which layer is to be removed: make one the target");
    let below = false;
    let covered = false;
    layers.forEach(function (layer, index) {
      const field = "layers/" + index + "/role";
      if (!layer.role) report(c, field, "say whether it is a mask, to be removed, or stays");
      if (layer.role === "mask" && below) report(c, field, "a mask lies on top: move it up, or give it another role");
      if (layer.role === "target" && covered) report(c, field, "a kept film covers this target: make that a target too, or a mask if it is patterned");
      if (layer.role !== "mask") below = true;
      if (layer.role === "under") covered = true;
    });
  }

  /** @param {Checking} c @param {any} file @param {number | null} whole thickness of all targets, nm */
  function goal(c, file, whole) {
    const goal = file.goal || {};
    for (const name of ["line", "window"]) {
      if (goal[name] !== undefined) quantity(c, "goal/" + name, goal[name], "length", true);
    }
    const load = goal.load_cm2;
    if (load !== undefined && !(typeof load === "number" && load > 0)) report(c, "goal/load_cm2", "give the open area as a number, in cm²");
    const depth = goal.depth;
    if (depth === undefined || depth === "through") return;
    if (depth === "through-wafer") {
      const targets = file.layers.map((/** @type {any} */ layer, /** @type {number} */ index) => ({ layer: layer, index: index })).filter((/** @type {any} */ one) => one.layer.role === "target");
      if (targets.length && !targets.some((/** @type {any} */ one) => isWafer(c.facts, one.layer.thickness))) report(c, "goal/depth", "no target is as thick as a wafer: list the wafer as a target");
      return;
    }
    const found = quantity(c, "goal/depth", depth, "length", true);
    if (found && whole !== null && /** @type {number} */ (found.value) > whole) report(c, "goal/depth", "goes beyond the targets: make the films below targets too, or give a smaller depth");
  }

  const WAFER_NM = 50000;

  /** @param {Facts} facts @param {string} thickness */
  function isWafer(facts, thickness) {
    try {
      return ew.units.parse(facts.units, thickness, "length").value >= WAFER_NM;
    } catch (error) {
      if (error instanceof ew.units.QuantityError) return true;
      throw error;
    }
  }

  /** @param {Checking} c @param {any} file */
  function steps(c, file) {
    const targets = file.layers.filter((/** @type {any} */ layer) => layer.role === "target").length;
    let etches = 0;
    (file.steps || []).forEach(function (/** @type {any} */ step, /** @type {number} */ index) {
      const field = "steps/" + index;
      if ((step.etch === undefined) === (step.treat === undefined)) return report(c, field + "/etch", "a step is either a treatment or an etch");
      if (step.etch !== undefined) {
        if (step.etchant || step.time || step.temperature) report(c, field + "/etch", "an etch takes etchant, time and temperature from its recipe");
        etches += 1;
        if (step.etch !== "any" && !ew.evidence.at(c.facts.etches, step.etch)) report(c, field + "/etch", 'there is no recipe "' + step.etch + '"');
        if (etches > targets) report(c, field + "/etch", "more etches than targets: nothing is left to remove");
        return;
      }
      if (step.etchant !== undefined && !ew.evidence.at(c.facts.etchants, step.etchant)) report(c, field + "/etchant", noEtchant(c, step.etchant));
      if (step.time !== undefined) quantity(c, field + "/time", step.time, "time", true);
      etchTemperature(c, field + "/temperature", step.temperature);
    });
  }

  /** @param {Checking} c @param {any} file */
  function limits(c, file) {
    const limits = file.limits || {};
    temperature(c, "limits/temperature", limits.temperature);
    etchTemperature(c, "temperature", file.temperature);
    for (const etchant of limits.etchants || []) {
      if (!ew.evidence.at(c.facts.etchants, etchant)) report(c, "limits/etchants", noEtchant(c, etchant));
    }
    for (const tool of limits.tools || []) {
      if (!c.facts.tools.has(tool)) report(c, "limits/tools", 'there is no tool "' + tool + '"');
    }
  }

  /** All that keeps a sample from being planned. @param {Facts} facts @param {any} file @returns {SampleProblem[]} */
  function check(facts, file) {
    /** @type {Checking} */
    const c = { facts: facts, problems: [] };
    if (!file.layers.length) report(c, "layers", "add the layers of your sample, from the top");
    const sizes = file.layers.map((/** @type {any} */ layer, /** @type {number} */ index) => film(c, "layers/" + index, layer));
    if (file.layers.length) order(c, file.layers);
    (file.also_exposed || []).forEach((/** @type {any} */ one, /** @type {number} */ index) => film(c, "also_exposed/" + index, one));
    if (file.back && file.back !== "protected") film(c, "back", file.back);
    const targets = sizes.filter((/** @type {any} */ _size, /** @type {number} */ index) => file.layers[index].role === "target");
    goal(c, file, targets.includes(null) ? null : targets.reduce((/** @type {number} */ sum, /** @type {number} */ one) => sum + one, 0));
    limits(c, file);
    steps(c, file);
    return c.problems;
  }

  ew.sampleCheck = Object.freeze({ check });
})((globalThis.etchwright = globalThis.etchwright || {}));
