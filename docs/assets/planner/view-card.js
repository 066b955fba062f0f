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

  /** @param {any} card */
  function steps(card) {
    const { el } = ew.dom;
    const line = (/** @type {any} */ step, /** @type {string} */ middle) => el("li", {}, el("strong", {}, step.name), middle ? ", " + middle : "", step.settings ? ": " + step.settings : "", step.note ? ". " + step.note : "");
    return block("Steps",
      el("ol", {}, (card.before || []).map((/** @type {string} */ one) => el("li", {}, "Before: " + one)),
        (card.steps || []).map((/** @type {any} */ step) => line(step, step.time)),
        (card.after || []).map((/** @type {any} */ step) => line(step, step.time))));
  }

  /** @param {any} card */
  function safety(card) {
    const { el } = ew.dom;
    const one = (/** @type {any} */ hazard) => [
      el("p", {}, el("strong", {}, hazard.name + ". "), hazard.wear.map((/** @type {string[]} */ pair) => pair[0] + ": " + pair[1] + ". ").join("")),
      el("p", {}, el("strong", {}, "First action. "), hazard.first.map((/** @type {string[]} */ pair) => pair[0] + ": " + pair[1] + ". ").join("")),
      el("p", { class: ew.hooks.quiet }, hazard.trust),
    ];
    return el("section", { class: ew.hooks.cardBlock + " " + ew.hooks.cardCaution }, el("h3", {}, card.signal + ". Wear, and if it goes wrong"),
      (card.never || []).map((/** @type {string} */ words) => el("p", {}, el("strong", {}, words))),
      (card.not_for || []).length > 0 && el("p", {}, el("strong", {}, "Not for: "), card.not_for.join("; ") + "."),
      (card.unknown || []).map((/** @type {string} */ words) => el("p", {}, words)),
      (card.hazards || []).map(one),
      el("p", {}, el("strong", {}, "Waste. "), card.waste),
      el("p", {}, (card.contacts || []).join(" · ")),
      el("p", {}, "The safety data sheet, the local rules and licensed practice come first. This card informs; it authorises nothing."));
  }

  /** @param {any} shown @param {Option} option */
  function verdicts(shown, option) {
    const { el, verdict } = ew.dom;
    const named = ew.viewOption.named(shown);
    return block("What should stay",
      el("ul", {}, option.rows.map((row) => el("li", {}, verdict(row.verdict), " " + ew.strings.capital(ew.strings.rowName(row, named)) + ": " + ew.strings.reason(row, named) + "."))),
      option.rows.length === 0 && el("p", {}, "No other film is reached."));
  }

  /** Room to write, one box for each column of the recipe's run table. @param {any} card */
  function toWrite(card) {
    const { el } = ew.dom;
    return block("Write down what you measured",
      el("div", { class: ew.hooks.cardWrite }, card.columns.map((/** @type {string} */ name) => el("div", { class: ew.hooks.cardLine }, name))));
  }

  /** The card, or nothing. @param {any} shown */
  function card(shown) {
    const { el } = ew.dom;
    const hooks = ew.hooks;
    const found = chosen(shown);
    if (!found) return null;
    const { option, stage, card } = found;
    const named = ew.viewOption.named(shown);
    return el("section", { class: hooks.card, "aria-labelledby": "plan-card-title" },
      el("p", { class: hooks.cardActions },
        ew.viewStack.button("Print the card", () => window.print(), { id: "plan-card-print" }), " ",
        ew.viewStack.button("Close the card", () => shown.send({ type: "card", key: null, focus: ew.viewFields.idOf("card/" + shown.state.card) }), { id: "plan-card-close" })),
      el("div", { class: hooks.cardHead },
        el("h2", { id: "plan-card-title" }, card.name),
        el("p", {}, "Sample " + shown.plan.sample + ": remove " + named(String(stage.target)) + ". " + card.tool + ", " + card.etchant + ", " + card.status + ". ", ew.dom.verdict(option.verdict))),
      times(shown, option),
      el("div", { class: hooks.cardColumns },
        steps(card),
        el("div", {},
          block("What clearing looks like", el("p", {}, card.clearing)),
          block("If it has not cleared", el("p", {}, card.if_not_cleared)),
          verdicts(shown, option))),
      (card.conditions || []).length > 0 && pairs(card.conditions),
      safety(card), toWrite(card),
      el("p", { class: hooks.cardFoot }, shown.data.lab + ". Records as of " + shown.plan.asOf + ", version " + card.version + ". " + (shown.data.notice || "")));
  }

  ew.viewCard = Object.freeze({ card });
})((globalThis.etchwright = globalThis.etchwright || {}));
