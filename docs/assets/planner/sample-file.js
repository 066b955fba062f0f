// @ts-check
/*
 * Sample files: JSON in the form of schemas/samples.schema.json. What a file holds beyond that form is left out,
 * and said so; what it holds of the wrong kind never gets further than this module.
 */
(function (ew) {
  "use strict";

  const MOST_LETTERS = 400;
  const MOST_ITEMS = 60;
  const MOST_BYTES = 200000;

  /** @typedef {{dropped: string[]}} Cleaning */
  /** @typedef {(value: any, field: string, cleaning: Cleaning) => any} Clean a value that fits, or undefined */

  /** @type {Clean} */
  function text(value, field, cleaning) {
    if (typeof value === "string" && value.length > 0 && value.length <= MOST_LETTERS) return value;
    return drop(field, cleaning);
  }

  /** @type {Clean} */
  function number(value, field, cleaning) {
    return typeof value === "number" && Number.isFinite(value) ? value : drop(field, cleaning);
  }

  /** @param {string} field @param {Cleaning} cleaning @returns {undefined} */
  function drop(field, cleaning) {
    cleaning.dropped.push(field);
    return undefined;
  }

  /** @param {string[]} words @returns {Clean} */
  function oneOf(words) {
    return (value, field, cleaning) => (words.includes(value) ? value : drop(field, cleaning));
  }

  /** @param {Clean} item @returns {Clean} */
  function listOf(item) {
    return function (value, field, cleaning) {
      if (!Array.isArray(value)) return drop(field, cleaning);
      if (value.length > MOST_ITEMS) cleaning.dropped.push(field + " beyond " + MOST_ITEMS);
      const kept = value.slice(0, MOST_ITEMS).map((one, index) => item(one, field + "/" + index, cleaning));
      return kept.filter((one) => one !== undefined);
    };
  }

  /** @param {{[name: string]: Clean}} fields @returns {Clean} */
  function objectOf(fields) {
    return function (value, field, cleaning) {
      if (typeof value !== "object" || value === null || Array.isArray(value)) return drop(field, cleaning);
      /** @type {{[name: string]: any}} */
      const kept = {};
      for (const name of Object.keys(value)) {
        const place = field ? field + "/" + name : name;
        if (!Object.prototype.hasOwnProperty.call(fields, name)) drop(place, cleaning);
        else {
          const found = fields[name](value[name], place, cleaning);
          if (found !== undefined) kept[name] = found;
        }
      }
      return kept;
    };
  }

  const FILM = { film: text, thickness: text, allowed_loss: text, on: text, surface: oneOf(["critical"]) };
  const layer = objectOf(Object.assign({ role: oneOf(["mask", "target", "under"]) }, FILM));
  const exposed = objectOf(Object.assign({ exposed: oneOf(["face", "sidewall", "both-faces"]) }, FILM));
  const backFilm = objectOf(FILM);
  const SAMPLE = objectOf({
    sample: text,
    layers: listOf(layer),
    also_exposed: listOf(exposed),
    back: (value, field, cleaning) => (value === "protected" ? value : backFilm(value, field, cleaning)),
    edge: oneOf(["open", "protected", "unused"]),
    goal: objectOf({ depth: text, window: text, line: text, load_cm2: number }),
    limits: objectOf({
      methods: listOf(oneOf(["wet", "vapour", "plasma", "cyclic", "lift-off"])), tools: listOf(text), etchants: listOf(text), temperature: text,
    }),
    mount: objectOf({ carrier: text, bond: text }),
    prior: listOf(text),
    steps: listOf(objectOf({
      treat: oneOf(["develop", "strip", "clean", "rework", "rinse"]), etch: text, etchant: text, time: text, temperature: text,
    })),
    temperature: text,
    note: text,
  });

  /** A sample without layers. @returns {any} */
  function empty() {
    return { sample: "my sample", layers: [] };
  }

  /** A sample in the form of the page, and what had to be left out. @param {any} data */
  function cleaned(data) {
    /** @type {Cleaning} */
    const cleaning = { dropped: [] };
    const file = SAMPLE(data, "", cleaning);
    if (!file || !Array.isArray(file.layers)) return { file: null, dropped: [], fault: "This is no sample: it has no list of layers." };
    return { file: file, dropped: cleaning.dropped, fault: "" };
  }

  /** The sample that a text in JSON holds. @param {string} json */
  function fromText(json) {
    if (json.length > MOST_BYTES) return { file: null, dropped: [], fault: "This file is too large for a sample." };
    try {
      return cleaned(JSON.parse(json));
    } catch (error) {
      if (!(error instanceof SyntaxError)) throw error;
      return { file: null, dropped: [], fault: "This is no JSON. For a sample in YAML, etchwright plan FILE --link prints a link to this page." };
    }
  }

  /** A sample without its blank fields, as a file holds it. @param {any} file @returns {any} */
  function pruned(file) {
    if (Array.isArray(file)) return file.map(pruned);
    if (typeof file !== "object" || file === null) return file;
    const kept = Object.entries(file).map(([name, value]) => [name, pruned(value)]).filter(([, value]) => !isBlank(value));
    return Object.fromEntries(kept);
  }

  /** @param {any} value */
  function isBlank(value) {
    if (value === undefined || value === null || value === "") return true;
    return typeof value === "object" && Object.keys(value).length === 0;
  }

  /** The text of a sample file that `etchwright plan` reads. @param {any} file */
  function toText(file) {
    return JSON.stringify(pruned(file), null, 2) + "\n";
  }

  ew.sampleFile = Object.freeze({ empty, cleaned, fromText, toText, pruned });
})((globalThis.etchwright = globalThis.etchwright || {}));
