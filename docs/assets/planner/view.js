// @ts-check
/* Puts the page together: builds the form when its shape changes, the drawing and the answers at every change. */
(function (ew) {
  "use strict";

  const QUIET_MS = 700;

  /** @param {string} name @returns {any} */
  function part(name) {
    return document.querySelector("[" + ew.hooks.part + '="' + name + '"]');
  }

  /** The sample as it is being built, in section. @param {any} shown */
  function drawing(shown) {
    const facts = shown.data.facts;
    const { layers, also_exposed: exposed, back } = shown.state.file;
    const drawn = (/** @type {any} */ film, /** @type {string} */ role) => {
      const known = ew.evidence.at(facts.films, film.film || "");
      return { name: known ? known.name : film.film || "which film?", family: known ? known.family : "other", role: role, thickness: film.thickness || "", thicknessNm: thicknessOf(facts, film.thickness), left: null };
    };
    const all = layers.map((/** @type {any} */ layer) => drawn(layer, layer.role));
    if (back && back !== "protected") all.push(Object.assign(drawn(back, "back"), { name: "back: " + drawn(back, "back").name }));
    const { el, swatch } = ew.dom;
    const beside = (exposed || []).map((/** @type {any} */ film) => drawn(film, "exposed"));
    return [
      ew.viewSection.stack(all),
      beside.length > 0 && el("p", { class: ew.hooks.beside }, "Also open: ", beside.flatMap((/** @type {any} */ one) => [swatch(one.family), one.name + (one.thickness ? ", " + one.thickness : "") + " "])),
    ];
  }

  /** @param {Facts} facts @param {any} text @returns {number | null} */
  function thicknessOf(facts, text) {
    try {
      return text ? ew.units.parse(facts.units, text, "length").value || null : null;
    } catch (error) {
      if (error instanceof ew.units.QuantityError) return null;
      throw error;
    }
  }

  /** The plan of a state, or what keeps it from being made. @param {PlannerData} data @param {any} state */
  function planned(data, state) {
    const facts = state.etchant ? data.reference : data.facts;
    // Published facts alone know no recipe, but a sample may name one all the same.
    const problems = ew.sampleCheck.check(data.facts, state.file);
    if (problems.length) return { problems: problems, plan: null };
    const sample = ew.sample.planSample(facts, state.file);
    const plan = ew.planning.plan(facts, sample, ew.sample.planSteps(facts, state.file), state.confidence, state.etchant);
    return { problems: [], plan: plan };
  }

  /** The page of some data; returns what shows a state. @param {PlannerData} data @param {(action: any) => void} send */
  function page(data, send) {
    const entries = ew.names.entriesOf(data.facts);
    let revision = -1;
    let timer = 0;
    return function show(/** @type {any} */ state, /** @type {string} */ focus) {
      const shown = Object.assign({ state: state, data: data, entries: entries.films, etchants: entries.etchants, send: send }, planned(data, state));
      if (state.revision !== revision) {
        ew.dom.fill(part("form"), ...ew.viewStack.form(shown));
        ew.viewBar.sync(shown);
        revision = state.revision;
      }
      ew.viewStack.showDefaults(shown);
      ew.viewFields.showProblems(part("form"), shown.problems);
      ew.dom.fill(part("drawing"), ...drawing(shown));
      ew.dom.fill(part("answers"), ...ew.viewAnswers.answers(shown).flat());
      ew.dom.fill(part("card"), ew.viewCard.card(shown));
      document.querySelector(ew.hooks.root)?.toggleAttribute(ew.hooks.cardShown, part("card").firstChild !== null);
      const target = focus ? document.getElementById(focus) : null;
      if (target) target.focus();
      clearTimeout(timer);
      // Read out once typing has paused, not at every letter.
      timer = window.setTimeout(() => (part("said").textContent = ew.viewAnswers.bestWords(shown, true)), QUIET_MS);
    };
  }

  /** What works only with scripts appears; what stands in for it goes. */
  function begin() {
    part("bar").hidden = part("columns").hidden = false;
    part("without-script").remove();
  }

  ew.view = Object.freeze({ page, part, begin });
})((globalThis.etchwright = globalThis.etchwright || {}));
