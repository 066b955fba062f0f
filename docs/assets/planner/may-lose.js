// @ts-check
/* What a film of a sample that is being built may lose where nothing is typed: the lab's default, as the model takes it. */
(function (ew) {
  "use strict";

  /** @param {Facts} facts @param {any} text @returns {Quantity | null} */
  function thickness(facts, text) {
    try {
      const found = text ? ew.units.parse(facts.units, String(text), "length") : null;
      return found && found.form === "value" && found.value ? found : null;
    } catch (error) {
      if (error instanceof ew.units.QuantityError) return null;
      throw error;
    }
  }

  /** @param {number | null} allowed @param {Allowance} rules */
  function sizeWords(allowed, rules) {
    return allowed === null ? "no default below " + ew.numbers.plainLength(rules.none_below_nm) + ": say how much" : ew.numbers.plainLength(allowed);
  }

  /** The default of one film in words, or nothing while the film is not yet known. @param {Facts} facts @param {any} film @param {string} role @param {boolean} nextToTarget @param {boolean} protects is it the mask on the target? */
  function words(facts, film, role, nextToTarget, protects) {
    const known = ew.evidence.at(facts.films, film.film || "");
    const found = thickness(facts, film.thickness);
    if (!known || !found) return "";
    const rules = facts.defaults.allowance;
    const thick = /** @type {number} */ (found.value);
    // The mask on the target lasts no longer than its thinnest place.
    const most = protects ? thick - (found.halfWidth === null ? facts.defaults.tolerance * thick : found.halfWidth) : Infinity;
    const sizes = [false, true].map(function (inPlasma) {
      const isResist = ew.films.ORGANIC.has(known.family) && inPlasma;
      const allowed = ew.words.allowedByDefault(rules, role, thick, nextToTarget, isResist);
      return sizeWords(allowed === null ? null : Math.max(0, Math.min(allowed, most)), rules);
    });
    if (sizes[0].startsWith("no default")) return sizes[0];
    return sizes[0] + (sizes[1] === sizes[0] ? "" : ", in plasma " + sizes[1]) + " (lab's default)";
  }

  /** The default of every film that should stay, by its place in the file. @param {Facts} facts @param {any} file @returns {Map<string, string>} */
  function byField(facts, file) {
    const found = new Map();
    const layers = file.layers;
    const isTarget = (/** @type {number} */ place) => layers[place] !== undefined && layers[place].role === "target";
    layers.forEach(function (/** @type {any} */ layer, /** @type {number} */ place) {
      if (layer.role !== "target") found.set("layers/" + place, words(facts, layer, layer.role, isTarget(place - 1), layer.role === "mask" && isTarget(place + 1)));
    });
    (file.also_exposed || []).forEach((/** @type {any} */ film, /** @type {number} */ place) => found.set("also_exposed/" + place, words(facts, film, "exposed", false, false)));
    if (file.back && file.back !== "protected") found.set("back", words(facts, file.back, "back", false, false));
    return found;
  }

  ew.mayLose = Object.freeze({ byField });
})((globalThis.etchwright = globalThis.etchwright || {}));
