// @ts-check
/* The answers beside the stack: the best one, what is not stated, every option worst film first, what is left out. */
(function (ew) {
  "use strict";

  /** The field that states what is asked for, by the code of what is not stated. @param {any} shown @param {Remark} item */
  function fieldOf(shown, item) {
    const fixed = { back: "back", edge: "edge", temperature: "temperature", load: "goal/load_cm2", line: "goal/line", window: "goal/window", stop: "mount/carrier" };
    const found = fixed[/** @type {keyof typeof fixed} */ (item.code)];
    if (found) return found;
    const end = item.code === "allowed" ? "/allowed_loss" : "/on";
    const { layers, also_exposed: exposed } = shown.state.file;
    const isIt = (/** @type {any} */ film) => film.film === item.params.film && film.role !== "target";
    const place = layers.findIndex(isIt);
    if (place >= 0) return "layers/" + place + end;
    const other = (exposed || []).findIndex(isIt);
    return other >= 0 ? "also_exposed/" + other + end : end === "/allowed_loss" ? "back" + end : "back";
  }

  /** Goes to a field, through whatever is folded around it. @param {string} field */
  function goTo(field) {
    const control = document.getElementById(ew.viewFields.idOf(field));
    if (!control) return;
    for (let place = control.closest("details"); place; place = place.parentElement ? place.parentElement.closest("details") : null) place.open = true;
    control.focus();
  }

  /** @param {any} shown */
  function problems(shown) {
    const { el } = ew.dom;
    return el("div", { class: ew.hooks.asked }, el("h3", {}, "Say this first"),
      el("ul", {}, shown.problems.map((/** @type {any} */ one) => el("li", {}, ew.viewStack.button(placeWords(shown, one.field) + one.words, () => goTo(one.field), { id: ew.viewFields.idOf("asked/" + one.field) })))));
  }

  /** @param {any} shown @param {string} field */
  function placeWords(shown, field) {
    const [list, index] = field.split("/");
    const film = (shown.state.file[list] || [])[index];
    if (list === "layers" && index !== undefined) return "Layer " + (Number(index) + 1) + (film && film.film ? ", " + ew.names.nameOf(shown.entries, film.film) : "") + ": ";
    if (list === "also_exposed") return "Exposed film " + (Number(index) + 1) + ": ";
    const words = { back: "Back: ", goal: "Goal: ", limits: "Limits: ", temperature: "Temperature: ", steps: "Step " + (Number(index) + 1) + ": " };
    return words[/** @type {keyof typeof words} */ (list)] || "";
  }

  /** What the best options of all stages would need to know. @param {any} shown */
  function notStated(shown) {
    const { el } = ew.dom;
    const named = ew.viewOption.named(shown);
    const all = shown.plan.stages.flatMap((/** @type {StagePlan} */ stage) => (stage.options.length ? stage.options[0].unstated : []));
    /** @type {Remark[]} */
    const items = ew.judging.distinctRemarks(all);
    if (!items.length) return null;
    return el("div", { class: ew.hooks.asked }, el("h3", {}, "Not stated, and the best answer needs it"),
      el("ul", {}, items.map((item) => el("li", {}, ew.viewStack.button(ew.strings.capital(ew.strings.unstatedWords(item, named)), () => goTo(fieldOf(shown, item)), { id: ew.viewFields.idOf("asked/" + item.code + "/" + (item.params.film || "")) })))));
  }

  /** The best answer in one line; `spoken` with the verdict in words, which otherwise stands before it. @param {any} shown @param {boolean} spoken */
  function bestWords(shown, spoken) {
    if (shown.problems.length) {
      return shown.state.file.layers.length ? "Not yet a whole sample: " + shown.problems[0].words.replace(/(?<![?.])$/, ".") : "Add the layers of your sample, from the top.";
    }
    const parts = shown.plan.stages.map((/** @type {StagePlan} */ stage) => stageWords(shown, stage, spoken || shown.plan.isSequence));
    return parts.filter(Boolean).join(" ");
  }

  /** @param {any} shown @param {StagePlan} stage @param {boolean} spoken */
  function stageWords(shown, stage, spoken) {
    const named = ew.viewOption.named(shown);
    const aim = stage.target ? named(stage.target) : stage.treat;
    if (!stage.treat && !stage.target) return "";
    if (stage.treat && !stage.options.length) return stage.treat === "rinse" ? "" : stage.step + ". " + ew.strings.capital(stage.treat) + ": unmeasured.";
    if (stage.treat && stage.options[0]) return stage.step + ". " + ew.strings.capital(stage.treat) + ": " + stage.options[0].verdict + ".";
    const start = shown.plan.isSequence ? stage.step + ". " + ew.strings.capital(aim) + ": " : "";
    const option = stage.options[0];
    if (!option) return start + "nothing on record removes " + aim + " on this sample.";
    return start + ew.viewOption.nameOf(shown, option) + (spoken ? ", " + option.verdict : "") + ", " + ew.viewOption.timesOf(option) + ".";
  }

  /** @param {any} shown */
  function best(shown) {
    const { el, verdict } = ew.dom;
    const planned = !shown.problems.length;
    return el("div", { class: ew.hooks.best, id: "plan-best" },
      planned && shown.plan.stages.length > 0 && verdict(ew.planning.verdictOf(shown.plan)),
      el("span", { class: ew.hooks.bestLine }, bestWords(shown, false)),
      ew.viewStack.button(planned ? "Answers" : "What is missing", toAnswers, { id: "plan-best-jump", class: ew.hooks.button + " " + ew.hooks.jump }));
  }

  /** On a phone the answers stand far below the form. */
  function toAnswers() {
    const title = document.getElementById("plan-answers-title");
    if (!title) return;
    title.focus({ preventScroll: true });
    title.scrollIntoView();
  }

  /** @param {any} shown @param {StagePlan} stage */
  function stage(shown, stage) {
    const { el } = ew.dom;
    const hooks = ew.hooks;
    const named = ew.viewOption.named(shown);
    const treatment = stage.treat ? ew.strings.capital(stage.treat) + (stage.etchant ? " in " + named(stage.etchant) : "") : "Etch";
    const aim = stage.target ? "Remove " + named(stage.target) : treatment;
    const drawn = stage.options.slice(0, shown.state.drawn);
    const rest = stage.options.length - drawn.length;
    return el("section", { class: hooks.stage },
      el("h3", {}, (shown.plan.isSequence ? stage.step + ". " : "") + aim),
      !stage.options.length && el("p", {}, emptyWords(stage)),
      el("ol", { class: hooks.options }, drawn.map((option) => ew.viewOption.item(shown, stage, option))),
      rest > 0 && ew.viewStack.button("Show " + Math.min(rest, ew.state.DRAWN) + " more of " + rest, () => shown.send({ type: "more" }), { id: ew.viewFields.idOf("more/" + stage.step) }),
      excluded(shown, stage));
  }

  /** Why a stage has no option. @param {StagePlan} stage */
  function emptyWords(stage) {
    if (stage.treat === "rinse" && !stage.etchant) return "In water.";
    if (stage.treat && !stage.etchant) return "No liquid is named, so nobody knows what it does.";
    if (!stage.target && !stage.treat) return "Nothing is left to etch: the depth asked for ends above it.";
    return "Nothing on record does it on this sample; what is left out and why stands below.";
  }

  /** @param {any} shown @param {StagePlan} stage */
  function excluded(shown, stage) {
    const { el, link } = ew.dom;
    if (!stage.excluded.length) return null;
    const named = ew.viewOption.named(shown);
    const id = ew.viewFields.idOf("excluded/" + stage.step);
    const key = "excluded/" + stage.step;
    const isOpen = shown.state.open.includes(key);
    const items = () => stage.excluded.map((one) =>
      el("li", {}, one.recipe ? link("recipes/" + one.recipe + ".html", shown.data.facts.etches[one.recipe].name) : named(one.etchant), ": " + ew.strings.excludedWords(one.reason, named) + "."));
    return el("div", { class: ew.hooks.excluded },
      ew.viewStack.button((isOpen ? "Hide" : "Show") + " the " + stage.excluded.length + " left out, and why", () => shown.send({ type: "open", key: key }), { id: id, "aria-expanded": String(isOpen) }),
      isOpen && el("ul", {}, items()));
  }

  /** All that stands beside the stack. @param {any} shown */
  function answers(shown) {
    const { el } = ew.dom;
    const notices = shown.state.notices.length > 0 &&
      el("ul", { class: ew.hooks.notices }, shown.state.notices.map((/** @type {string} */ words) => el("li", {}, words)));
    if (shown.problems.length) return [notices, best(shown), problems(shown)];
    return [notices, best(shown), notStated(shown), shown.plan.stages.map((/** @type {StagePlan} */ one) => stage(shown, one))];
  }

  ew.viewAnswers = Object.freeze({ answers, bestWords });
})((globalThis.etchwright = globalThis.etchwright || {}));
