// @ts-check
/* The run card: one sheet to carry to the bench, made of a recipe's card and a plan's numbers. */
(function (ew) {
  "use strict";

  /** @param {string} title @param {...any} children */
  function block(title, ...children) {
    const { el } = ew.dom;
    return el("section", { class: ew.hooks.cardBlock }, el("h3", {}, title), ...children);
  }

  /** @param {any[][]} rows */
  function pairs(rows) {
    const { el } = ew.dom;
    return el("dl", { class: ew.hooks.facts }, rows.flatMap(([term, text]) => [el("dt", {}, term), el("dd", {}, text)]));
  }

  /** The option whose card is asked for, with its stage. @param {any} shown */
  function chosen(shown) {
    if (shown.state.card === null || shown.problems.length) return null;
    for (const stage of shown.plan.stages) {
      const option = stage.options.find((/** @type {Option} */ one) => ew.viewOption.keyOf(shown, stage, one) === shown.state.card);
      if (option && option.recipe) return { stage: stage, option: option, card: shown.data.cards[option.recipe] };
    }
    return null;
  }

  /** @param {any} shown @param {Option} option */
  function times(shown, option) {
    const { el } = ew.dom;
    const { time } = ew.numbers;
    const plan = option.schedule;
    const isTimed = option.mode === "run-to-time";
    return block("Times",
      el("p", { class: ew.hooks.cardBig }, isTimed ? "Run to time: " + time(plan.latestStopS, "up") : "First look: " + time(plan.firstLookS, "down") + "   Latest stop: " + time(plan.latestStopS, "up")),
      el("p", {}, (isTimed ? "If you look on the way: first after " + time(plan.firstLookS, "down") + ". " : "Rinse at the first look, look or measure, then finish. ") + "Clears between " + time(plan.clearFirstS, "down") + " and " + time(plan.clearLastS, "up") + ". " + foundBy(shown, option)));
  }

  /** @param {number} fraction */
  function percent(fraction) {
    const text = ew.numbers.plain(fraction * 100);
    return (text.includes(".") ? text.replace(/\.?0+$/, "") : text) + "\u00a0%";
  }

  /** How the times were found. @param {any} shown @param {Option} option */
  function foundBy(shown, option) {
    const numbers = ew.numbers;
    const band = /** @type {Band} */ (option.targetBand);
    const rate = numbers.full(numbers.rate(band.low, band.mid, band.high));
    return "Found from " + rate + " (" + ew.strings.rankWords(option.targetRank) + ", next run at " + Math.round(shown.state.confidence * 100) + " % confidence), unevenness " + percent(option.phi) +
      (option.offsetS ? ", offset " + numbers.plain(option.offsetS) + " s" : "") + (option.overetch ? ", overetch " + percent(option.overetch) : "") + "; first look at 0.8 of the earliest clearing.";
  }

  /** The planned time, for the step that it sets. @param {Option} option */
  function planned(option) {
    const { time } = ew.numbers;
    const { firstLookS, latestStopS } = option.schedule;
    if (option.mode === "run-to-time") return time(latestStopS, "up");
    return "first look " + time(firstLookS, "down") + ", latest stop " + time(latestStopS, "up");
  }

  /** @param {any} card @param {Option} option */
  function steps(card, option) {
    const { el } = ew.dom;
    // The planned time is that of one step; which of several it is divided over, nobody has said.
    const isOne = (card.steps || []).filter((/** @type {any} */ step) => step.by_plan).length === 1;
    const line = (/** @type {any} */ step, /** @type {string} */ middle) => el("li", {}, el("strong", {}, step.name), middle ? ", " + middle : "", step.settings ? ": " + step.settings : "", step.note ? ". " + step.note : "");
    return block("Steps",
      el("ol", {}, (card.before || []).map((/** @type {string} */ one) => el("li", {}, "Before: " + one)),
        (card.steps || []).map((/** @type {any} */ step) => line(step, step.by_plan && isOne ? planned(option) : step.time)),
        (card.after || []).map((/** @type {any} */ step) => line(step, step.time))));
  }

  /** @param {any} card */
  function safety(card) {
    const { el } = ew.dom;
    const one = (/** @type {any} */ hazard) => [
      el("p", {}, el("strong", {}, hazard.name + ". "), hazard.wear.map((/** @type {string[]} */ pair) => pair[0] + ": " + pair[1] + ". ").join("")),
      el("p", {}, el("strong", {}, "First action. "), hazard.first.map((/** @type {string[]} */ pair) => pair[0] + ": " + pair[1] + ". ").join("")),
    ];
    return el("section", { class: ew.hooks.cardBlock + " " + ew.hooks.cardCaution }, el("h3", {}, card.signal + ". Wear, and if it goes wrong"),
      (card.never || []).map((/** @type {string} */ words) => el("p", {}, el("strong", {}, words))),
      (card.not_for || []).length > 0 && el("p", {}, el("strong", {}, "Not for: "), card.not_for.join("; ") + "."),
      (card.unknown || []).map((/** @type {string} */ words) => el("p", {}, words)),
      (card.hazards || []).map(one),
      el("p", {}, el("strong", {}, "Waste. "), card.waste),
      el("p", {}, (card.contacts || []).join(" · ")),
      el("p", {}, "The safety data sheet, the local rules and licensed practice come first. This card informs; it authorises nothing." +
        ((card.hazards || []).length ? " Verify against the SDS; sources on the page of the chemical." : "")));
  }

  /** @param {any} shown @param {Option} option */
  function verdicts(shown, option) {
    const { el, verdict } = ew.dom;
    const named = ew.viewOption.named(shown);
    return block("What should stay",
      el("ul", {}, option.rows.map((row) => el("li", {}, verdict(row.verdict), " " + ew.strings.capital(ew.strings.rowName(row, named)) + ": " + ew.strings.reason(row, named) + "."))),
      option.rows.length === 0 && el("p", {}, "No other film is reached."));
  }

  /** The sample as it was typed, so that the card tells at the bench which wafer it is for. @param {any} shown @param {Option} option */
  function sampleBlock(shown, option) {
    const { el } = ew.dom;
    const { layers, also_exposed: exposed, back, edge } = shown.state.file;
    const roles = { mask: "mask", target: "to be removed", under: "stays" };
    const line = (/** @type {any} */ film, /** @type {string} */ role, /** @type {string} */ words) =>
      el("li", {}, ew.viewOption.named(shown)(film.film) + ", " + film.thickness + ", " + words + goes(shown, option, film, role));
    return block("Your sample, from the top",
      el("ol", {}, layers.map((/** @type {any} */ film) => line(film, film.role, roles[/** @type {keyof typeof roles} */ (film.role)]))),
      (exposed || []).length > 0 && el("ul", {}, exposed.map((/** @type {any} */ film) => line(film, "exposed", "also open"))),
      el("p", {}, back && back !== "protected" ? ["Back: ", named(shown, back) + goes(shown, option, back, "back")] : back === "protected" ? "Back: protected" : "Back: not stated",
        ". Edge: " + (ew.viewStack.edgeWords(edge || "")) + ". " + edgeMoves(option)));
  }

  /** @param {any} shown @param {any} film */
  function named(shown, film) {
    return ew.viewOption.named(shown)(film.film) + ", " + film.thickness;
  }

  /** What may go of a film, or that the etch does not get there. @param {any} shown @param {Option} option @param {any} film @param {string} role */
  function goes(shown, option, film, role) {
    if (role === "target") return "";
    const thickness = ew.sample.thicknessNm(shown.data.facts, film);
    const isIt = (/** @type {FilmRow} */ one) => one.film === film.film && one.thicknessNm === thickness;
    const row = option.rows.find((one) => isIt(one) && one.role === role);
    if (!row && role === "under") {
      // The lowest layer may be reached from its back, once what lies there is gone.
      const back = option.rows.find((one) => isIt(one) && one.role === "back");
      if (back) return ", reached from the back, " + ew.viewOption.allowedWords(back);
    }
    if (!row) return ", not reached";
    return ", " + ew.viewOption.allowedWords(row) + (film.allowed_loss === undefined && row.allowedNm !== null ? " (lab's default)" : "");
  }

  /** @param {Option} option */
  function edgeMoves(option) {
    const way = option.undercut;
    if (way.high === null) return "How far each edge moves is not on record.";
    return "Each edge moves " + ew.numbers.full(ew.numbers.length(way.low, way.mid, way.high)) + ".";
  }

  /** What a test piece would settle; what only has to be stated stands on the page. @param {any} shown @param {Option} option */
  function settled(shown, option) {
    const { el } = ew.dom;
    const tests = ew.viewOption.testPieces(shown, option);
    return tests.length > 0 && block("What would settle it", el("ul", {}, tests.map((/** @type {string} */ words) => el("li", {}, words))));
  }

  /** Room to write, one box for each column of the recipe's run table. @param {any} shown @param {any} card @param {Option} option */
  function toWrite(shown, card, option) {
    const { el } = ew.dom;
    const hooks = ew.hooks;
    const legend = card.columns.filter((/** @type {string} */ name) => shown.data.legend[name]).map((/** @type {string} */ name) => [el("strong", {}, name), " " + shown.data.legend[name] + " "]);
    return block("Write down what you measured",
      el("div", { class: hooks.cardWrite }, card.columns.map((/** @type {string} */ name) =>
        el("div", { class: hooks.cardLine }, name, name === "film" && el("span", { class: hooks.cardGiven }, String(option.target))))),
      el("p", { class: hooks.cardFoot }, legend));
  }

  /** Boxes to tick and a line to sign. @param {any} card */
  function toSign(card) {
    const { el } = ew.dom;
    const hooks = ew.hooks;
    const box = (/** @type {any} */ hazard) => el("span", {}, el("span", { class: hooks.cardBox, "aria-hidden": "true" }), hazard.name);
    const hazards = card.hazards || [];
    return el("p", { class: hooks.cardSign }, hazards.length > 0 && "Protective equipment read:", hazards.map(box), el("span", { class: hooks.cardBy }, "Run by / date"));
  }

  /** The card, or nothing. @param {any} shown */
  function card(shown) {
    const { el } = ew.dom;
    const hooks = ew.hooks;
    const found = chosen(shown);
    if (!found) return null;
    const { option, stage, card } = found;
    const name = ew.viewOption.named(shown);
    return el("section", { class: hooks.card, "aria-labelledby": "plan-card-title" },
      el("p", { class: hooks.cardActions },
        ew.viewStack.button("Print the card", () => window.print(), { id: "plan-card-print" }), " ",
        ew.viewStack.button("Close the card", () => shown.send({ type: "card", key: null, focus: ew.viewFields.idOf("card/" + shown.state.card) }), { id: "plan-card-close" })),
      el("div", { class: hooks.cardHead },
        el("h2", { id: "plan-card-title" }, card.name),
        el("p", {}, "Sample " + shown.plan.sample + ": remove " + name(String(stage.target)) + ". " + card.tool + ", " + card.etchant + ", " + card.status + ". ", ew.dom.verdict(option.verdict))),
      times(shown, option),
      el("div", { class: hooks.cardColumns },
        el("div", {}, sampleBlock(shown, option), steps(card, option)),
        el("div", {},
          block("What clearing looks like", el("p", {}, card.clearing, " ", ew.strings.clearingWords(option, name))),
          block("If it has not cleared", el("p", {}, card.if_not_cleared, " ", el("strong", {}, "Never beyond the latest stop, " + ew.numbers.time(option.schedule.latestStopS, "up") + " in all, without a new plan."))),
          verdicts(shown, option), settled(shown, option))),
      (card.conditions || []).length > 0 && pairs(card.conditions),
      safety(card), toWrite(shown, card, option), toSign(card),
      el("p", { class: hooks.cardFoot }, shown.data.lab + ". Records as of " + shown.plan.asOf + ", version " + card.version + ". " + (shown.data.notice || "")));
  }

  ew.viewCard = Object.freeze({ card });
})((globalThis.etchwright = globalThis.etchwright || {}));
