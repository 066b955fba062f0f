// @ts-check
/*
 * The stages of a whole plan, and what a treatment does.
 * Twin of builder/findings/plan/{planning,treatment}.py.
 */
(function (ew) {
  "use strict";

  const WORKS_ON_RESIST = new Set(["develop", "strip", "rework"]);

  /** @param {number} confidence @param {Extent | null} temperature @returns {Asked} */
  function asking(confidence, temperature) {
    const at = temperature ? temperature.low + ".." + temperature.high : "";
    return { confidence: confidence, temperature: temperature, key: confidence + "@" + at };
  }

  /**
   * The plan of a sample: one stage a target, or the steps of a sequence, each starting where the last ended.
   * With `etchant`, one option by published facts alone: `facts` must then be `ew.data.referenceFacts`.
   * @param {Facts} facts @param {PlanSample} sample @param {PlanStep[]} steps @param {number} confidence
   * @param {string | null} etchant @returns {Plan}
   */
  function plan(facts, sample, steps, confidence, etchant) {
    const asked = asking(confidence, sample.temperature);
    const isSequence = steps.length > 0 && etchant === null;
    const stages = isSequence ? sequence(facts, sample, steps, asked) : targets(facts, sample, asked, etchant);
    return { sample: sample.name, asOf: facts.as_of, confidence: confidence, stages: stages, isSequence: steps.length > 0 || stages.length > 1 };
  }

  /** @param {Facts} facts @param {PlanSample} sample @param {Asked} asked @param {string | null} etchant @returns {StagePlan[]} */
  function targets(facts, sample, asked, etchant) {
    /** @type {StagePlan[]} */
    const stages = [];
    let state = { sample: sample, removed: 0, wetWith: /** @type {string | null} */ (null) };
    const count = ew.sample.stagesOf(sample).length;
    for (let number = 0; number < count; number += 1) {
      const stage = ew.sample.stagesOf(state.sample)[number];
      const planned = etchStage(facts, stage, asked, number + 1, null, etchant, state.wetWith);
      stages.push(planned);
      state = afterEtch(state, planned);
    }
    return stages;
  }

  /** @param {Facts} facts @param {PlanSample} sample @param {PlanStep[]} steps @param {Asked} asked @returns {StagePlan[]} */
  function sequence(facts, sample, steps, asked) {
    /** @type {StagePlan[]} */
    const stages = [];
    let state = { sample: sample, removed: 0, wetWith: /** @type {string | null} */ (null) };
    steps.forEach(function (step, index) {
      const here = step.temperature ? asking(asked.confidence, step.temperature) : asked;
      if (step.treat !== null) {
        const planned = treatStage(facts, state, step, here, index + 1);
        stages.push(planned);
        state = afterTreatment(facts, state, planned, step);
        return;
      }
      const stage = ew.sample.stagesOf(state.sample)[state.removed];
      if (!stage) {
        // The depth ends above the target that this step was meant for.
        stages.push({ step: index + 1, target: null, treat: null, etchant: null, timeS: null, stage: stageAfter(state), options: [], excluded: [] });
        return;
      }
      const only = step.etch === null || step.etch === "any" ? null : step.etch;
      const planned = etchStage(facts, stage, here, index + 1, only, null, state.wetWith);
      stages.push(planned);
      state = afterEtch(state, planned);
    });
    return stages;
  }

  /** @param {Facts} facts @param {Stage} stage @param {Asked} asked @param {number} number @param {string | null} only @param {string | null} etchant @param {string | null} wetWith @returns {StagePlan} */
  function etchStage(facts, stage, asked, number, only, etchant, wetWith) {
    const found = etchant === null ? ew.offers.offers(facts, stage, asked, only) : etchantOffer(facts, stage, asked, etchant);
    const kept = withoutClashes(facts, found.options, wetWith);
    return {
      step: number, target: stage.target.film, treat: null, etchant: null, timeS: null, stage: stage,
      options: kept.options, excluded: [...found.excluded, ...kept.excluded],
    };
  }

  /** The one option of an etchant alone, even where nothing tells its time. @param {Facts} facts @param {Stage} stage @param {Asked} asked @param {string} etchant */
  function etchantOffer(facts, stage, asked, etchant) {
    const option = ew.option.planOption(facts, ew.data.etchingOf(facts, etchant), stage, asked);
    return { options: [option], excluded: /** @type {Excluded[]} */ ([]) };
  }

  /** @param {Facts} facts @param {PlanState} state @param {PlanStep} step @param {Asked} asked @param {number} number @returns {StagePlan} */
  function treatStage(facts, state, step, asked, number) {
    const stage = stageAfter(state);
    const bare = { step: number, target: null, treat: step.treat, etchant: step.etchant, timeS: step.timeS, stage: stage };
    if (step.etchant === null) return Object.assign({ options: [], excluded: [] }, bare);
    const option = treatmentOption(facts, state, step, asked);
    return Object.assign(withoutClashes(facts, [option], state.wetWith), bare);
  }

  /** The stage that comes next; after the last target, its edges and what is below it lie open. @param {PlanState} state @returns {Stage} */
  function stageAfter(state) {
    const stages = ew.sample.stagesOf(state.sample);
    if (state.removed < stages.length) return stages[state.removed];
    const last = stages[stages.length - 1];
    return Object.assign({}, last, { above: [last.target, ...last.above] });
  }

  /** What a treatment does to every film that it reaches. @param {Facts} facts @param {PlanState} state @param {PlanStep} step @param {Asked} asked @returns {Option} */
  function treatmentOption(facts, state, step, asked) {
    const etching = ew.data.etchingOf(facts, step.etchant);
    const stage = stageAfter(state);
    const timing = fixedTiming(facts, etching, stage, step.timeS);
    const reach = ew.films.reaching(facts, etching, asked, stage, timing);
    const leavesMasks = !WORKS_ON_RESIST.has(/** @type {string} */ (step.treat));
    // In a fixed time there is nothing to look for.
    const found = ew.films
      .casesOfTreatment(reach, openFilms(state, stage), leavesMasks)
      .map((/** @type {Case} */ one) => Object.assign({}, one, { byLook: one.byTimer }));
    const couples = ew.couples.couplings(reach, found);
    const unknown = ew.times.UNKNOWN_SPAN;
    // The step sets the time, so no target's rate enters; but no own run has tried this chamber either.
    const caps = { targetRank: "literature", caps: couples.planCaps, undercut: unknown, undercutByLook: unknown };
    const rows = ew.option.judgedRows(reach, found, caps, couples);
    const best = step.timeS !== null && !couples.planCaps.length ? "holds" : "borderline";
    const remark = ew.films.remark;
    return {
      recipe: null, etchant: etching.etchant.id, method: reach.method, verdict: ew.option.worstOf(rows, best, "verdict"),
      verdictByLook: ew.option.worstOf(rows, best, "verdictByLook"), target: null, targetRank: "none", targetBand: null,
      targetSources: [], schedule: timing.schedule, mode: null, undercut: unknown, undercutByLook: unknown, rows: rows,
      planCaps: couples.planCaps,
      notes: [
        ...ew.option.gasFacts(facts, etching, state.sample).map((/** @type {GasFact} */ fact) => remark("gas", { words: fact.words })),
        ...etching.etchant.cautions.map((/** @type {string} */ words) => remark("hazard", { words: words })),
        ...couples.notes,
      ],
      unstated: ew.option.unstated(reach, rows), bares: null, proven: false, hazard: etching.etchant.hazard, hasMargin: false,
      phi: timing.cut.phi, offsetS: 0, overetch: 0, later: [],
    };
  }

  /** Films in the windows, top first. @param {PlanState} state @param {Stage} stage */
  function openFilms(state, stage) {
    const isLeft = state.removed < ew.sample.stagesOf(state.sample).length || !ew.option.isThrough(state.sample, stage.target);
    return isLeft ? [stage.target, ...stage.below] : stage.below.filter((film) => film.role !== "target");
  }

  /** @param {Facts} facts @param {Etching} etching @param {Stage} stage @param {number | null} timeS @returns {Timing} */
  function fixedTiming(facts, etching, stage, timeS) {
    const thickness = stage.target.thicknessNm;
    const cut = {
      depthNm: thickness, thicknessNm: thickness, tolerance: 0, phi: ew.option.phiOf(facts, etching), offsetS: 0,
      overetch: 0, reactionS: ew.option.reactionOf(facts, etching), through: true,
    };
    if (timeS === null) return { band: null, cut: cut, schedule: ew.times.UNKNOWN_SCHEDULE };
    // Both clearings at the fixed time make the two exposures from the start equal to it.
    const fixed = { nominalS: timeS, clearFirstS: timeS, clearLastS: timeS, latestStopS: timeS };
    return { band: null, cut: cut, schedule: Object.assign({}, ew.times.UNKNOWN_SCHEDULE, fixed) };
  }

  /** Take out what must not meet the liquid that the sample comes from, and caution against the rest. @param {Facts} facts @param {Option[]} options @param {string | null} wetWith */
  function withoutClashes(facts, options, wetWith) {
    if (wetWith === null) return { options: options, excluded: [] };
    /** @type {Option[]} */
    const kept = [];
    /** @type {Excluded[]} */
    const excluded = [];
    for (const option of options) {
      const met = meetings(facts, wetWith, option.etchant);
      const values = (/** @type {MeetingFact} */ fact) => ({ first: wetWith, second: option.etchant, words: fact.words });
      const forbidden = met.find((fact) => fact.forbidden);
      if (forbidden) {
        excluded.push({ recipe: option.recipe, etchant: option.etchant, reason: ew.films.remark("meeting", values(forbidden)) });
      } else {
        const notes = met.map((fact) => ew.films.remark("meeting", values(fact)));
        kept.push(notes.length ? Object.assign({}, option, { notes: [...option.notes, ...notes] }) : option);
      }
    }
    return { options: kept, excluded: excluded };
  }

  /** Rules on an etchant that meets what is left of another; the same one twice is no meeting. @param {Facts} facts @param {string | null} first @param {string} second @returns {MeetingFact[]} */
  function meetings(facts, first, second) {
    if (first === null || first === second) return [];
    return facts.meetings.filter((fact) => fact.pairs.some((pair) => pair[0] === first && pair[1] === second));
  }

  /** @param {PlanState} state @param {StagePlan} stage @returns {PlanState} */
  function afterEtch(state, stage) {
    // An etch ends with its own rinse; what it was etched with is no longer on the sample.
    const after = ew.sample.cut(ew.sample.wornSample(state.sample, stage.options[0] || null), state.removed);
    return { sample: after, removed: state.removed + 1, wetWith: null };
  }

  /** @param {Facts} facts @param {PlanState} state @param {StagePlan} stage @param {PlanStep} step @returns {PlanState} */
  function afterTreatment(facts, state, stage, step) {
    const wetWith = step.treat === "rinse" ? null : step.etchant || state.wetWith;
    if (stage.etchant === null) return { sample: state.sample, removed: state.removed, wetWith: wetWith };
    const after = ew.sample.wornSample(state.sample, stage.options[0] || null);
    return { sample: step.treat === "strip" ? ew.sample.stripped(facts, after, state.removed) : after, removed: state.removed, wetWith: wetWith };
  }

  /** The worst word among the best options of all stages. @param {Plan} planned */
  function verdictOf(planned) {
    const words = planned.stages
      // A rinse that names no etchant is one in water; of any other such treatment nobody knows what it does.
      .filter((stage) => stage.treat !== "rinse" || stage.etchant !== null)
      .map((stage) => (stage.options.length ? stage.options[0].verdict : "unmeasured"));
    return words.length ? ew.words.worst(words, "holds") : "unmeasured";
  }

  ew.planning = Object.freeze({ plan, verdictOf });
})((globalThis.etchwright = globalThis.etchwright || {}));
