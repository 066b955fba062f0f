// @ts-check
/*
 * Reads the data that the page carries, checks that it has the form this program knows, and fills in what the
 * data leaves out because it is the default.
 */
(function (ew) {
  "use strict";

  const FORMAT = 1;
  const FACTS_FORMAT = 1;

  const FILM = { is_family: false, members: [], barrier: "unknown", electrical: null, noble: false, similar: [], adhesion: [], names: [], formula: "" };
  const ETCHANT = {
    isotropic: false, gas_bubbles: false, hf_vapour: false, temperature: null, hazard: 0, cautions: [],
    rows: {}, said: {}, gas: {}, alone: {}, bond: [],
  };
  const ETCH = {
    transfer_s: 0, temperature: null, cycle_s: null, ratio: null, masks: [], own: {}, gas: {}, forbidden: [],
    cautions: [], clearing: "", if_not_cleared: "",
  };
  const OWN = { limit_s: null, temperature: null, load_cm2: null, window_nm: null, induction_s: null, stale_days: null };
  const LEVEL = { mid: null };
  const ROW = { low: null, high: null, tested_s: null, temperature: null, per_cycle: false };
  const SAID = { temperature: null };
  const GAS = { from_nm: 0 };
  const COUPLE = { affects: null };

  /** The data of the page, ready for the model. @param {any} given @returns {PlannerData} */
  function read(given) {
    if (!given || given.format !== FORMAT || given.facts.format !== FACTS_FORMAT) {
      throw new Error("The data of this page has another form than its program: build the site again.");
    }
    const facts = prepared(given.facts, given);
    const reference = Object.assign({}, given.facts, given.reference, {
      etchants: Object.assign({}, given.facts.etchants, given.reference.etchants),
    });
    return { facts: facts, reference: prepared(reference, given), cards: given.cards, legend: given.legend, samples: given.samples, sources: given.sources, lab: given.lab };
  }

  /** @param {any} plain @param {any} given @returns {Facts} */
  function prepared(plain, given) {
    const films = mapped(plain.films, (/** @type {any} */ film) => Object.assign({}, FILM, film));
    const etchants = mapped(plain.etchants, etchantOf);
    const etches = mapped(plain.etches, etchOf);
    return Object.assign({ refused: {}, meetings: [], bond_words: "" }, plain, {
      films: films, etchants: etchants, etches: etches,
      couples: (plain.couples || []).map((/** @type {any} */ one) => Object.assign({}, COUPLE, one)),
      families: Object.values(films).filter((film) => film.is_family),
      etchings: Object.values(etches).map((recipe) => ({ etchant: etchants[recipe.etchant], recipe: recipe, known: new Map() })),
      alone: new Map(), couplings: new Map(), standing: new Map(),
      bondPattern: plain.bond_words ? new RegExp(plain.bond_words, "i") : null,
      tools: new Map(Object.entries(given.tools)), rules: given.rules, quantiles: given.quantiles, units: ew.units.tableOf(given.units),
    });
  }

  /** @param {any} etchant */
  function etchantOf(etchant) {
    const filled = Object.assign({}, ETCHANT, etchant);
    filled.rows = mapped(filled.rows, (/** @type {any[]} */ rows) => filledAll(ROW, rows));
    filled.said = mapped(filled.said, (/** @type {any[]} */ said) => filledAll(SAID, said));
    filled.gas = mapped(filled.gas, (/** @type {any[]} */ gas) => filledAll(GAS, gas));
    filled.alone = mapped(filled.alone, (/** @type {any[]} */ gas) => filledAll(GAS, gas));
    filled.bond = filledAll(GAS, filled.bond);
    return filled;
  }

  /** @param {any} etch */
  function etchOf(etch) {
    const filled = Object.assign({}, ETCH, etch);
    filled.gas = mapped(filled.gas, (/** @type {any[]} */ gas) => filledAll(GAS, gas));
    filled.own = mapped(filled.own, (/** @type {any} */ own) =>
      Object.assign({}, OWN, own, { levels: filledAll(LEVEL, own.levels) }),
    );
    return filled;
  }

  /** @param {object} defaults @param {any[]} items */
  function filledAll(defaults, items) {
    return items.map((item) => Object.assign({}, defaults, item));
  }

  /** @param {{[id: string]: any}} map @param {(value: any) => any} change @returns {{[id: string]: any}} */
  function mapped(map, change) {
    return Object.fromEntries(Object.entries(map).map(([id, value]) => [id, change(value)]));
  }

  /** An etchant without a recipe. @param {Facts} facts @param {string} etchant @returns {Etching} */
  function etchingOf(facts, etchant) {
    let etching = facts.alone.get(etchant);
    if (!etching) {
      etching = { etchant: facts.etchants[etchant], recipe: null, known: new Map() };
      facts.alone.set(etchant, etching);
    }
    return etching;
  }

  /** One-sided normal quantile of a two-sided confidence; only stored ones are known. @param {Facts} facts @param {number} confidence @returns {number} */
  function quantile(facts, confidence) {
    const found = facts.quantiles.find((one) => one.confidence === confidence);
    if (!found) throw new Error("no quantile at a confidence of " + confidence);
    return found.quantile;
  }

  ew.data = Object.freeze({ read, etchingOf, quantile });
})((globalThis.etchwright = globalThis.etchwright || {}));
