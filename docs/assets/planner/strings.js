// @ts-check
/*
 * Sentences of a plan, made of its codes. Twin of builder/views/{plan_words,plan_cap_words,test_piece}.py; `named` turns the id of a film or
 * an etchant into the name that is shown.
 */
(function (ew) {
  "use strict";

  /** @typedef {(id: string) => string} Named */

  const RANKS = {
    own: "own runs", literature: "literature", unchecked: "literature, unchecked",
    statement: "a statement without a number", similar: "a similar film", none: "nothing on record",
  };
  const GROUNDS = {
    "any-loss-accepted": "it may vanish",
    "no-high-end": "only a lowest rate is known; nothing bounds the loss",
    "no-allowance": "no allowed loss is stated, and the film is too thin for a default",
    unchecked: "the number is recalled, not checked",
    "target-unchecked": "the target's own rate is not checked, so the time is not sure",
    "beyond-tested-time": "no loss was seen, but nobody tested that long",
    "statement-resists": "said to withstand it; nobody measured how well",
    "statement-adverse": "said to suffer in it; no rate on record",
    "statement-attacks": "said to be attacked",
    "no-evidence": "nothing on record for this film in this etch",
    "time-unknown": "nobody knows how long the etch takes, so its loss is unknown",
  };
  const ALL = "all of it";
  const OF_A_MEMBER = {
    "mild-end-exceeds": "even the mild end takes more of one than is allowed",
    straddles: "one may lose more than is allowed",
    "within-allowed": "each loses no more than is allowed",
  };
  /** @type {{[code: string]: (p: any, named: Named) => string}} */
  const CAPS = {
    adverse: (p) => "on record: it " + p.effect,
    adhesion: (p, named) => "no record that this mask stays on " + named(p.on) + " in this recipe",
    "adhesion-time": (p, named) =>
      "the mask was seen to stay on " + named(p.on) + " for " + time(p.held_s) + " only" +
      (p.stop_s === null ? "" : ", and the etch may take " + time(p.stop_s)),
    back: () => "what covers the back is not stated, and the back is wet from the start",
    barrier: (p, named) => named(p.under) + " may be reached through it: nobody has shown that it is dense",
    "carrier-load": (p, named) => "the carrier is bare " + named(p.film) + " too, and no run had such a load",
    conflict: () => "one own run contradicts the literature",
    couple: (p, named) => named(p.one) + " and " + named(p.other) + " are wet together; no record of that couple",
    "couple-undercut": (p, named) => named(p.one) + " with " + named(p.other) + ": " + clause(p.words),
    "earlier-loss": () => "nobody knows what an earlier step has taken",
    edge: () => "whether the sample's edge is open is not stated",
    family: () => "the film is not known exactly; the worst of those it may be counts",
    heat: () => "no record of cooling; the mask may get hot",
    "heat-limit": (p) =>
      "the sample may see " + kelvin(p.limit_k) + ", and " +
      (p.at_k === null ? "how hot this etch gets is not on record" : "the etch is asked for at " + kelvin(p.at_k)),
    line: (p) => "a line of " + size(p.line_nm) + " may lose " + size(p.undercut_nm) + " from each edge",
    load: (p) => "a load of " + area(p.load_cm2) + " is far from that of the runs, " + between(area(p.low_cm2), area(p.high_cm2)),
    "published-chamber": () => "the number is from another chamber, and this one has no own run",
    "through-wafer": () => "etching through the wafer needs a carrier or a film to stop on",
    "under-noble": (p, named) => named(p.layer) + " is usual under " + named(p.film) + "; what lies there is not stated",
    "undercut-assumed": () => "the undercut is a rule of thumb here; this recipe has none on record",
    "undercut-unknown": () => "how far the edge moves is not on record, and a line width is asked for",
    window: (p) =>
      "an opening of " + size(p.window_nm) + " is far from that of the runs, " + between(size(p.low_nm), size(p.high_nm)),
  };
  const LIFTS = {
    adverse: "look at a test piece under the microscope and record what you see",
    adhesion: "record a mask that stayed on this film, with its preparation and time",
    "adhesion-time": "run a test piece for longer and record the time the mask held",
    back: "state the film on the back, or that it is protected",
    barrier: "record that the film is dense, or that the mask held",
    "carrier-load": "state the load with the carrier in it, or use a carrier of another film",
    conflict: "run a second monitor wafer",
    couple: "etch a piece with both films and record the couple",
    "couple-undercut": "avoid the contact, or measure the undercut on a test piece",
    "earlier-loss": "measure the film after the earlier step",
    edge: "state whether the edge is open, protected or unused",
    family: "name the film as deposited",
    heat: "record the recipe's cooling",
    "heat-limit": "record the recipe's temperature, or pick a cooler etch",
    line: "make the line wider, or pick an etch with less undercut",
    load: "run a monitor wafer with this load",
    "published-chamber": "run one monitor wafer of the target in this chamber",
    "through-wafer": "state the carrier, or the film to stop on",
    "under-noble": "state the film under it, or that there is none",
    "undercut-assumed": "measure the undercut and record it in the recipe",
    "undercut-unknown": "measure the undercut and record it in the recipe",
    window: "run a monitor wafer with this opening",
  };
  /** @type {{[code: string]: (p: any, named: Named) => string}} */
  const LOST = {
    couple: (p, named) => named(p.one) + " touching " + named(p.other) + ": " + clause(p.words),
    line: (p) => "a line of " + size(p.line_nm) + " loses at least " + size(p.undercut_nm) + " from each edge and stands on nothing",
    "mask-fails": (p) => "on record: this mask " + p.effect + " here",
    roughened: () => "it roughens, and its surface is critical",
  };
  /** @type {{[code: string]: (p: any, named: Named) => string}} */
  const NOTES = {
    "not-a-target": (p, named) => "The recipe is not meant for " + named(p.film) + "; its rate is on record.",
    draft: () => "The recipe is a draft: nobody has called it proven.",
    conflict: () => "Own runs and the literature contradict each other; the own runs count.",
    far: () => "Own runs were at another temperature and do not count here.",
    stale: (p, named) => "The newest run of " + named(p.film) + " is " + p.days + " days old: run a monitor wafer first.",
    "all-temperatures": () => "No temperature is asked for: the rates span all on record.",
    "time-outside-runs": (p) =>
      "The runs lasted " + between(time(p.low_s), time(p.high_s)) + "; up to " + time(p.stop_s) +
      " nobody has shown that the rate stays the same.",
    "couple-target": (p, named) => named(p.one) + " with " + named(p.other) + ": " + clause(p.words) + ".",
    "undercut-assumed": () => "An isotropic etch goes sideways at least as far as down (common practice, no source).",
    gas: (p) => p.words,
    meeting: (p, named) => "Rinse well between " + named(p.first) + " and " + named(p.second) + ": " + p.words,
    hazard: (p) => p.words,
  };
  /** @type {{[code: string]: (p: any, named: Named) => string}} */
  const UNSTATED = {
    back: () => "the film on the back, or that it is protected",
    edge: () => "whether the edge is open, protected or unused",
    "under-noble": (p, named) => "what lies under " + named(p.film) + ", or that nothing does",
    allowed: (p, named) => "how much of " + named(p.film) + " may go",
    temperature: () => "the temperature of the etch",
    load: () => "the open area",
    line: () => "the width of the narrowest masked line",
    stop: () => "a carrier, or a film to stop on",
    window: () => "the width of the narrowest opening",
  };
  const SETTLED_BY_TEST = new Set(["beyond-tested-time", "no-evidence", "no-high-end", "straddles", "unchecked"]);
  /** Ten minutes: long enough to see a nanometre a minute, short enough to be done today. */
  const TEST_S = 600;
  const HINTS = {
    temperature: "a rate is on record at another temperature",
    conditions: "a rate or a statement is on record under other conditions",
  };
  /** @type {{[code: string]: (p: any, named: Named) => string}} */
  const EXCLUDED = {
    "no-evidence": (p, named) =>
      "nothing on record for " + named(p.film) + " here" + (p.hint === null ? "" : " (" + hintWords(p.hint, named) + ")"),
    "does-not-etch": (p, named) => "no etching of " + named(p.film) + " was seen",
    retired: () => "retired",
    "tool-refuses": (p) => p.words,
    method: (p) => p.method + " is outside the sample's limits",
    tool: (p) => p.tool + " is outside the sample's limits",
    etchant: (p, named) => named(p.etchant) + " is outside the sample's limits",
    "too-hot": (p) => "runs at " + kelvin(p.recipe_k) + ", and the sample may see " + kelvin(p.limit_k),
    "other-temperature": (p) => "runs at " + kelvin(p.recipe_k) + ", not at " + kelvin(p.asked_k),
    safety: (p) => "not allowed: " + p.words,
    meeting: (p, named) => named(p.first) + " must not be carried into " + named(p.second) + ": " + p.words,
  };

  const time = (/** @type {number} */ value) => ew.numbers.time(value);
  const size = (/** @type {number} */ value) => ew.numbers.plainLength(value);
  const area = (/** @type {number} */ value) => ew.numbers.plain(value) + "\u00a0cm²";
  const kelvin = (/** @type {number} */ value) => ew.numbers.temperature(value);
  const between = (/** @type {string} */ low, /** @type {string} */ high) => (low === high ? low : low + " to " + high);

  /** @param {string} words */
  function clause(words) {
    const text = words.replace(/\.+$/, "");
    return text.slice(0, 1).toLowerCase() + text.slice(1);
  }

  /** @param {string} text */
  function capital(text) {
    return text.slice(0, 1).toUpperCase() + text.slice(1);
  }

  /** Names as a list in words. @param {string[]} names */
  function listed(names) {
    return names.length === 1 ? names[0] : names.slice(0, -1).join(", ") + " and " + names[names.length - 1];
  }

  /** Why a film has its word. @param {FilmRow} row @param {Named} named */
  function reason(row, named) {
    if (row.lost) return LOST[row.lost.code](row.lost.params, named);
    const back = row.caps.find((cap) => cap.code === "back");
    if (back) return CAPS.back(back.params, named);
    // What keeps a film from "holds" says nothing where the word is worse anyhow.
    const caps = row.verdict === "borderline" ? row.caps : [];
    const couples = caps.filter((cap) => cap.code === "couple");
    const others = caps.filter((cap) => cap.code !== "couple").map((cap) => CAPS[cap.code](cap.params, named));
    return [ground(row), ...(couples.length ? [coupleWords(row.film, couples, named)] : []), ...others].join("; ");
  }

  /** One clause for all couples of a film that have no record. @param {string} film @param {Remark[]} couples @param {Named} named */
  function coupleWords(film, couples, named) {
    const partners = new Set(couples.flatMap((cap) => [cap.params.one, cap.params.other]));
    partners.delete(film);
    const names = Array.from(partners).sort().map(named);
    return "wet together with " + listed(names) + ", and no record of that couple";
  }

  /** @param {FilmRow} row */
  function ground(row) {
    if (row.ground === "no-allowance" && row.spentNm === null) return "how much of it may still go is not known";
    const fixed = GROUNDS[/** @type {keyof typeof GROUNDS} */ (row.ground)];
    if (fixed) return fixed;
    // A family with a member that nobody measured has no loss as a whole, but a member's word stands.
    if (row.loss.low === null) return "of the films it may be, " + OF_A_MEMBER[/** @type {keyof typeof OF_A_MEMBER} */ (row.ground)];
    const numbers = ew.numbers;
    const isOpen = row.allowedNm === null || row.allowedNm === Infinity;
    const allowed = isOpen ? "" : " of " + size(/** @type {number} */ (row.allowedNm)) + " allowed";
    const limit = isOpen ? "" : "; allowed is " + size(/** @type {number} */ (row.allowedNm));
    if (row.ground === "mild-end-exceeds") {
      const goes = Math.min(row.loss.low, leftOf(row));
      const least = numbers.withUnit(numbers.length(goes, null, null)).replace(/^at least /, "");
      return "even the mild end takes " + least + (takesAll(row, row.loss.low) ? " (" + ALL + ")" : "") + limit;
    }
    if (row.loss.high === null) return "at worst an unknown amount" + allowed;
    return "at worst " + worstWords(row, row.loss.high) + (takesAll(row, row.loss.high) ? limit : allowed);
  }

  /** Does a loss reach what earlier steps have left of a film? @param {FilmRow} row @param {number} lossNm */
  function takesAll(row, lossNm) {
    return lossNm >= leftOf(row);
  }

  /** @param {FilmRow} row */
  function leftOf(row) {
    return Math.max(0, row.thicknessNm - (row.spentNm || 0));
  }

  /** The worst end of a loss, rounded up. @param {FilmRow} row @param {number} highNm */
  function worstWords(row, highNm) {
    const high = ew.numbers.withUnit(ew.numbers.length(null, null, highNm));
    return takesAll(row, highNm) ? ALL : high.replace(/^at most /, "");
  }

  /** What goes of a film, with its interval; a film cannot lose more than there is. @param {FilmRow} row @param {Span} span */
  function lossWords(row, span) {
    const { length, withUnit, full } = ew.numbers;
    const { low, mid, high } = span;
    if (low !== null && takesAll(row, low)) return "loses " + ALL;
    if (high === null || !takesAll(row, high)) {
      const words = full(length(low, mid, high));
      return words === ew.numbers.UNKNOWN ? "loss unknown" : "loses " + words;
    }
    if (low === null) return "loses at worst " + ALL;
    const least = withUnit(length(low, null, null)).replace(/^at least /, "");
    const likely = mid === null || takesAll(row, mid) ? "" : withUnit(length(null, mid, null)) + ", ";
    return "loses " + likely + "from " + least + " to " + ALL;
  }

  /** Whose look the recipe's words on clearing describe, and what shows on this sample. @param {Option} option @param {Named} named */
  function clearingWords(option, named) {
    const seen = "As seen on this recipe's own wafers.";
    return option.bares === null ? seen : seen + " Under your target lies " + named(option.bares) + ": expect its look, not that of another film.";
  }

  /** @param {string | null} hint @param {Named} named @returns {string} */
  function hintWords(hint, named) {
    if (hint === null) return "";
    if (hint.startsWith("similar:")) return "a similar film is on record: " + named(hint.slice("similar:".length));
    return HINTS[/** @type {keyof typeof HINTS} */ (hint)];
  }

  /** The one sentence that stands first. @param {Option} option @param {Named} named */
  function blocker(option, named) {
    const row = option.rows[0];
    if (!row) return withoutFilms(option, named);
    if (option.verdict === "holds") return "Every film holds; closest is " + rowName(row, named) + ": " + reason(row, named) + ".";
    if (option.verdict !== row.verdict) return withoutFilms(option, named);
    const verbs = { lost: "is lost", borderline: "may not last", unmeasured: "is unmeasured" };
    return capital(rowName(row, named)) + " " + verbs[/** @type {keyof typeof verbs} */ (row.verdict)] + ": " + reason(row, named) + ".";
  }

  /** @param {Option} option @param {Named} named */
  function withoutFilms(option, named) {
    if (option.schedule.latestStopS === null) return "How long the etch takes is not on record.";
    if (option.verdict === "holds") return "No other film is reached.";
    if (option.planCaps.length) return capital(CAPS[option.planCaps[0].code](option.planCaps[0].params, named)) + ".";
    return "The target's rate rests on " + rankWords(option.targetRank) + ".";
  }

  /** A film with its place. @param {FilmRow} row @param {Named} named */
  function rowName(row, named) {
    const name = named(row.film);
    if (row.role === "mask") return "the mask " + name;
    if (row.role === "under") return name + " under the target";
    if (row.role === "back") return name + " on the back";
    return row.role === "exposed" ? "exposed " + name : name;
  }

  /** @param {string} rank */
  function rankWords(rank) {
    return RANKS[/** @type {keyof typeof RANKS} */ (rank)];
  }

  /** The short test that would settle a film's word, or nothing where stating something would. @param {FilmRow} row @param {string} family @param {Named} named */
  function testPieceWords(row, family, named) {
    if ((row.rank === "own" || row.rank === "literature") && !SETTLED_BY_TEST.has(row.ground)) return "";
    const isReached = row.exposure !== null && row.exposure.highS > 0;
    const timeS = isReached ? Math.min(TEST_S, /** @type {Exposure} */ (row.exposure).highS) : TEST_S;
    const where = row.role === "mask" ? " on the same film as here" : "";
    return "etch a test piece of " + named(row.film) + where + " for " + time(timeS) + " and read " + gaugeWords(family);
  }

  /** @param {string} family */
  function gaugeWords(family) {
    if (family === "metal") return "the step or the sheet resistance before and after";
    return family === "semiconductor" ? "the thickness or the step before and after" : "the thickness before and after on the optical gauge";
  }

  /** What would lift a cap. @param {string} code */
  function liftWords(code) {
    return LIFTS[/** @type {keyof typeof LIFTS} */ (code)];
  }

  const capWords = (/** @type {Remark} */ cap, /** @type {Named} */ named) => CAPS[cap.code](cap.params, named);
  const noteWords = (/** @type {Remark} */ note, /** @type {Named} */ named) => NOTES[note.code](note.params, named);
  const unstatedWords = (/** @type {Remark} */ item, /** @type {Named} */ named) => UNSTATED[item.code](item.params, named);
  const excludedWords = (/** @type {Remark} */ item, /** @type {Named} */ named) => EXCLUDED[item.code](item.params, named);

  ew.strings = Object.freeze({
    reason, blocker, worstWords, lossWords, takesAll, clearingWords, rowName, rankWords, liftWords, testPieceWords, capWords, noteWords, unstatedWords, excludedWords, hintWords, capital, listed,
  });
})((globalThis.etchwright = globalThis.etchwright || {}));
