// @ts-check
/*
 * The address bar holds the whole sample: `#s1=` and the sample file as JSON in base64url, then what else is asked.
 * The home page asks with `#remove=FILM&keep=FILM,FILM`. Twin of builder/views/planner_link.py.
 */
(function (ew) {
  "use strict";

  const VERSION = "s1";
  /** Thicknesses where the home page gives none, as `etchwright remove` takes them. */
  const TARGET = "100 nm";
  const KEPT = "1 um";

  /** @typedef {{file: any | null, confidence: number | null, etchant: string | null, notices: string[]}} Restored */

  /** @param {string} text */
  function toBase64(text) {
    let bytes = "";
    for (const byte of new TextEncoder().encode(text)) bytes += String.fromCharCode(byte);
    return btoa(bytes).replace(/\+/g, "-").replace(/\//g, "_").replace(/=+$/, "");
  }

  /** @param {string} code */
  function fromBase64(code) {
    const bytes = atob(code.replace(/-/g, "+").replace(/_/g, "/"));
    return new TextDecoder("utf-8", { fatal: true }).decode(Uint8Array.from(bytes, (letter) => letter.charCodeAt(0)));
  }

  /** The fragment that restores a sample. @param {any} file @param {number | null} confidence @param {string | null} etchant */
  function encode(file, confidence, etchant) {
    let fragment = "#" + VERSION + "=" + toBase64(JSON.stringify(ew.sampleFile.pruned(file)));
    if (confidence !== null) fragment += "&confidence=" + confidence;
    if (etchant !== null) fragment += "&etchant=" + encodeURIComponent(etchant);
    return fragment;
  }

  /** What a fragment holds; what it cannot restore is said. @param {string} fragment @param {Facts} facts @returns {Restored} */
  function decode(fragment, facts) {
    const query = new URLSearchParams(fragment.replace(/^#/, ""));
    /** @type {Restored} */
    const restored = { file: null, confidence: null, etchant: null, notices: [] };
    if (query.has("remove")) return asked(query, facts, restored);
    const code = query.get(VERSION);
    if (code !== null) restore(code, restored);
    else {
      const other = Array.from(query.keys()).find((name) => /^s[0-9]+$/.test(name));
      if (other) restored.notices.push("This link has form " + other + ", and this page reads form " + VERSION + ": the sample could not be restored. Build it again, or load its file.");
    }
    const confidence = Number(query.get("confidence"));
    if (facts.quantiles.some((one) => one.confidence === confidence)) restored.confidence = confidence;
    else if (query.has("confidence")) restored.notices.push("No intervals are stored at the confidence of this link; the lab's own is used.");
    const etchant = query.get("etchant");
    if (etchant !== null && ew.evidence.at(facts.etchants, etchant)) restored.etchant = etchant;
    else if (etchant !== null) restored.notices.push('There is no etchant "' + etchant + '" here.');
    return restored;
  }

  /** @param {string} code @param {Restored} restored */
  function restore(code, restored) {
    try {
      const found = ew.sampleFile.fromText(fromBase64(code));
      restored.file = found.file;
      if (found.fault) restored.notices.push("The link is damaged: " + found.fault);
      if (found.dropped.length) restored.notices.push("Left out of the link, because no sample has it: " + found.dropped.join(", ") + ".");
    } catch {
      restored.notices.push("The link is damaged: its sample could not be read. Perhaps it was cut off when it was copied.");
    }
  }

  /** The question of the home page as a sample. @param {URLSearchParams} query @param {Facts} facts @param {Restored} restored */
  function asked(query, facts, restored) {
    const target = query.get("remove") || "";
    const keep = (query.get("keep") || "").split(",").filter((film) => film);
    const known = keep.filter((film) => ew.evidence.at(facts.films, film));
    restored.file = ew.sampleFile.empty();
    restored.file.layers = ew.evidence.at(facts.films, target) ? [{ film: target, thickness: TARGET, role: "target" }] : [];
    if (known.length) restored.file.also_exposed = known.map((film) => ({ film: film, thickness: KEPT, exposed: "face" }));
    const unknown = [target, ...keep].filter((film) => film && !ew.evidence.at(facts.films, film));
    if (unknown.length) restored.notices.push("Not on record here: " + unknown.join(", ") + ".");
    restored.notices.push("The thicknesses are placeholders: put in yours, and say where each film stands.");
    return restored;
  }

  ew.address = Object.freeze({ encode, decode });
})((globalThis.etchwright = globalThis.etchwright || {}));
