// @ts-check
/* One option: its line in the list, and opened, what is left of every film, why, and what each number rests on. */
(function (ew) {
  "use strict";

  const HEADS = ["Film", "By the timer", "If you look and finish", "Why"];
  const BAR = { width: 120, height: 18, pad: 4 };

  /** What an option is called. @param {any} shown @param {Option} option */
  function nameOf(shown, option) {
    const facts = shown.data.facts;
    if (option.recipe) return facts.etches[option.recipe].name;
    return facts.etchants[option.etchant].name + (option.target === null ? "" : ", alone");
  }

  /** When to look and stop, in words. @param {Option} option */
  function timesOf(option) {
    const times = option.schedule;
    const { time } = ew.numbers;
    if (times.latestStopS === null) return "time unknown";
    if (option.target === null) return "for " + time(times.latestStopS);
    if (option.mode === "run-to-time") return "run to time, " + time(times.latestStopS, "up");
    return "first look " + time(times.firstLookS, "down") + ", stop by " + time(times.latestStopS, "up");
  }

  /** @param {any} shown */
  function named(shown) {
    const { films, etchants } = shown.data.facts;
    return (/** @type {string} */ id) => {
      const found = ew.evidence.at(films, id) || ew.evidence.at(etchants, id);
      return found ? found.name : id;
    };
  }

  /** @param {any} shown @param {StagePlan} stage @param {Option} option */
  function keyOf(shown, stage, option) {
    return stage.step + "/" + (option.recipe || "alone") + "/" + option.etchant;
  }

  /** One item of the list. @param {any} shown @param {StagePlan} stage @param {Option} option */
  function item(shown, stage, option) {
    const { el, verdict } = ew.dom;
    const hooks = ew.hooks;
    const key = keyOf(shown, stage, option);
    const isOpen = shown.state.open.includes(key);
    const id = ew.viewFields.idOf("option/" + key);
    const head = el("button", {
      type: "button", class: hooks.head, id: id, "aria-expanded": String(isOpen), "aria-controls": id + "-detail",
      onclick: () => shown.send({ type: "open", key: key }),
    }, verdict(option.verdict), el("span", { class: hooks.name }, nameOf(shown, option)), el("span", { class: hooks.times }, timesOf(option)));
    return el("li", { class: hooks.option }, el("h4", {}, head),
      el("p", { class: hooks.blocker }, ew.strings.blocker(option, named(shown))),
      el("div", { class: hooks.detail, id: id + "-detail", hidden: !isOpen }, isOpen && detail(shown, stage, option, key)));
  }

  /** @param {any} shown @param {StagePlan} stage @param {Option} option @param {string} key */
  function detail(shown, stage, option, key) {
    const { el, link } = ew.dom;
    const hooks = ew.hooks;
    const etchant = shown.data.facts.etchants[option.etchant];
    const where = [
      option.recipe && link("recipes/" + option.recipe + ".html", "Recipe and its runs"), " ",
      link("etchants/" + option.etchant + ".html", etchant.name),
    ];
    return [
      drawing(shown, stage, option),
      facts(shown, option),
      films(shown, option),
      listOf("Mind", option.notes.map((note) => ew.strings.noteWords(note, named(shown)))),
      listOf("What would settle it", lifts(shown, option)),
      el("p", { class: hooks.buttons }, option.recipe && option.schedule.latestStopS !== null &&
        ew.viewStack.button("Run card", () => shown.send({ type: "card", key: key, focus: "plan-card-close" }), { id: ew.viewFields.idOf("card/" + key) }), where),
    ];
  }

  /** @param {string} title @param {string[]} lines */
  function listOf(title, lines) {
    const { el } = ew.dom;
    if (!lines.length) return null;
    return [el("h5", {}, title), el("ul", {}, lines.map((line) => el("li", {}, line)))];
  }

  /** What would lift each cap, and which test would give the numbers that are missing. @param {any} shown @param {Option} option */
  function lifts(shown, option) {
    const { capital, capWords, liftWords, rowName } = ew.strings;
    /** @type {Map<string, string>} */
    const byCode = new Map();
    const add = (/** @type {Remark} */ cap, /** @type {string} */ whose) => {
      const words = whose ? whose + ": " + capWords(cap, named(shown)) : capWords(cap, named(shown));
      if (!byCode.has(cap.code)) byCode.set(cap.code, capital(words) + ". " + capital(liftWords(cap.code)) + ".");
    };
    option.planCaps.forEach((cap) => add(cap, ""));
    // "It" and "this mask" in a film's own caution mean that film.
    option.rows.forEach((row) => row.caps.forEach((cap) => add(cap, rowName(row, named(shown)))));
    return [...byCode.values(), ...testPieces(shown, option)];
  }

  /** The tests that would give the numbers that are missing. @param {any} shown @param {Option} option @returns {string[]} */
  function testPieces(shown, option) {
    const tests = option.rows.map((row) => ew.strings.testPieceWords(row, shown.data.facts.films[row.film].family, named(shown)));
    return ew.evidence.distinct(tests.filter(Boolean)).map((/** @type {string} */ words) => ew.strings.capital(words) + ".");
  }

  /** The part of a film that stays in the worst case; null where nobody knows. @param {FilmRow | undefined} row @param {number} thickness */
  function leftOf(row, thickness) {
    if (!row) return 1;
    if (row.loss.high === null) return row.verdict === "lost" ? 0 : null;
    return Math.max(0, 1 - ((row.spentNm || 0) + row.loss.high) / thickness);
  }

  /** @param {any} shown @param {StagePlan} stage @param {Option} option */
  function drawing(shown, stage, option) {
    const { el } = ew.dom;
    const { layers: stack, back } = stage.stage.sample;
    const isBackReached = back !== null && option.rows.some((row) => row.role === "back" && row.film === back.film);
    const layers = [...stack, ...(back && isBackReached ? [back] : [])].map((film) => drawnLayer(shown, stage, option, film));
    const ratio = option.undercut.mid !== null && stage.stage.target.thicknessNm ? option.undercut.mid / stage.stage.target.thicknessNm : 0;
    const words = layers.map((layer) => layer.name + ": " + layer.remark);
    return el("div", { class: ew.hooks.drawing }, ew.viewSection.beforeAfter(layers, ratio, "Section before and after the etch, at worst. " + words.join("; ")));
  }

  /** @param {any} shown @param {StagePlan} stage @param {Option} option @param {PlanFilm} film */
  function drawnLayer(shown, stage, option, film) {
    const isTarget = film === stage.stage.target && option.target !== null;
    const row = option.rows.find((one) => one.film === film.film && one.role === film.role && one.thicknessNm === film.thicknessNm);
    const depth = isTarget ? ew.sample.depthIn(stage.stage.sample, film) : null;
    const whole = depth === null || depth >= film.thicknessNm;
    const left = isTarget ? (whole ? 0 : 1 - /** @type {number} */ (depth) / film.thicknessNm) : leftOf(row, film.thicknessNm);
    const name = (film.role === "back" ? "back: " : "") + named(shown)(film.film);
    const remark = isTarget ? (whole ? "gone" : "etched to depth") : remarkOf(row);
    return { name: name, remark: remark, family: shown.data.facts.films[film.film].family, role: isTarget ? "target" : film.role === "target" ? "under" : film.role, thicknessNm: film.thicknessNm, left: left };
  }

  /** @param {FilmRow | undefined} row */
  function remarkOf(row) {
    if (!row) return "not reached";
    if (row.loss.high === null) return row.verdict === "lost" ? "lost" : "loss unknown";
    return "at worst " + ew.strings.worstWords(row, row.loss.high) + " gone";
  }

  /** @param {any} shown @param {Option} option */
  function facts(shown, option) {
    const { el } = ew.dom;
    const numbers = ew.numbers;
    const times = option.schedule;
    if (option.target === null) return null;
    const band = option.targetBand;
    const rate = band ? numbers.full(numbers.rate(band.low, band.mid, band.high)) : "unknown";
    const undercut = numbers.length(option.undercut.low, option.undercut.mid, option.undercut.high);
    const rows = [
      ["Rate", [rate + ", next run at " + Math.round(shown.state.confidence * 100) + " % ", el("span", { class: "ew-rank" }, ew.strings.rankWords(option.targetRank)), sources(shown, option.targetSources)]],
      ["Clears", times.clearFirstS === null ? "unknown" : "between " + numbers.time(times.clearFirstS, "down") + " and " + numbers.time(times.clearLastS, "up") + (times.nominalS === null ? "" : ", most likely " + numbers.time(times.nominalS))],
      ["Then", option.mode === "run-to-time" ? "run to time, " + numbers.time(times.latestStopS, "up") : option.mode === null ? "unknown" : "look first after " + numbers.time(times.firstLookS, "down") + ", finish, and stop by " + numbers.time(times.latestStopS, "up")],
      ["If you look and finish", ew.dom.verdict(option.verdictByLook)],
      ["Edge moves", numbers.full(undercut)],
      ...clearing(shown, option),
    ];
    return el("dl", { class: ew.hooks.facts }, rows.flatMap(([term, text]) => [el("dt", {}, term), el("dd", {}, text)]));
  }

  /** @param {any} shown @param {Option} option */
  function clearing(shown, option) {
    const recipe = option.recipe ? shown.data.facts.etches[option.recipe] : null;
    return recipe && recipe.clearing ? [["Cleared", [recipe.clearing, " ", ew.strings.clearingWords(option, named(shown))]]] : [];
  }

  /** @param {any} shown @param {string[]} ids */
  function sources(shown, ids) {
    return ids.flatMap((id) => [" ", ew.dom.link("bibliography.html#" + id, shown.data.sources[id] || id)]);
  }

  /** @param {any} shown @param {Option} option */
  function films(shown, option) {
    const { el } = ew.dom;
    if (!option.rows.length) return null;
    return el("div", { class: ew.hooks.filmsBox, role: "region", tabindex: 0, "aria-label": "What happens to each film" },
      el("table", { class: ew.hooks.films },
        el("thead", {}, el("tr", {}, HEADS.map((head) => el("th", { scope: "col" }, head)))),
        el("tbody", {}, option.rows.map((row) => filmRow(shown, row)))));
  }

  /** @param {any} shown @param {FilmRow} row */
  function filmRow(shown, row) {
    const { el, link, swatch } = ew.dom;
    const quiet = (/** @type {...any} */ ...words) => el("div", { class: ew.hooks.quiet }, ...words);
    const film = shown.data.facts.films[row.film];
    const hint = row.hint ? ew.strings.capital(ew.strings.hintWords(row.hint, named(shown))) + "." : "";
    const place = { mask: "mask", under: "under the target", exposed: "exposed", back: "back" }[row.role] || row.role;
    return el("tr", {},
      el("th", { scope: "row" }, swatch(film.family), link("films/" + row.film + ".html", film.name), quiet(place + (row.assumed ? ", supposed" : "")), quiet(allowedWords(row))),
      el("td", { "data-label": HEADS[1] }, loss(row, row.verdict, row.loss)), el("td", { "data-label": HEADS[2] }, loss(row, row.verdictByLook, row.lossByLook)),
      el("td", { "data-label": HEADS[3] }, ew.strings.capital(ew.strings.reason(row, named(shown))) + ".", hint && quiet(hint),
        el("div", {}, el("span", { class: "ew-rank" }, ew.strings.rankWords(row.rank)), sources(shown, row.sources))));
  }

  /** @param {FilmRow} row */
  function allowedWords(row) {
    if (row.allowedNm === null) return "may lose: not stated";
    return row.allowedNm === Infinity ? "may vanish" : "may lose " + ew.numbers.plainLength(row.allowedNm);
  }

  /** A verdict with the loss it comes from. @param {FilmRow} row @param {string} verdict @param {Span} span */
  function loss(row, verdict, span) {
    const { el } = ew.dom;
    const words = ew.strings.lossWords(row, span);
    return [ew.dom.verdict(verdict), el("div", {}, words), bar(row, span, words + ", " + allowedWords(row))];
  }

  /** An interval on a scale from zero, with what is allowed marked. @param {FilmRow} row @param {Span} span @param {string} words */
  function bar(row, span, words) {
    const { svg } = ew.dom;
    if (span.low === null && span.high === null) return null;
    const limit = row.allowedNm === Infinity ? null : row.allowedNm;
    const known = [row.loss.high, row.loss.mid, row.loss.low, row.lossByLook.high, limit].filter((one) => one !== null);
    const top = Math.max(.../** @type {number[]} */ (known)) * (span.high === null ? 1.6 : 1) || 1;
    const at = (/** @type {number} */ value) => ew.section.tenth(BAR.pad + (BAR.width - 2 * BAR.pad) * Math.min(Math.max(value / top, 0), 1));
    const start = at(span.low || 0);
    const end = span.high === null ? BAR.width : at(span.high);
    const isOpen = span.high === null || span.low === null;
    return svg("svg", { class: "ew-bar " + ew.hooks.lossBar, viewBox: "0 0 " + BAR.width + " " + BAR.height, width: BAR.width, height: BAR.height, role: "img", "aria-label": words },
      svg("rect", { class: "ew-bar-reach" + (isOpen ? " ew-bar-open" : ""), x: start, y: 6, width: Math.max(end - start, 2), height: 6 }),
      span.mid !== null && svg("path", { class: "ew-bar-middle", d: "M" + at(span.mid) + " 3V15" }),
      limit !== null && svg("path", { class: "ew-bar-limit", d: "M" + at(limit) + " 0V18" }));
  }

  ew.viewOption = Object.freeze({ item, nameOf, timesOf, named, keyOf, allowedWords, testPieces });
})((globalThis.etchwright = globalThis.etchwright || {}));
