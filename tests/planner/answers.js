// What the browser's model says to the cases of python_answers.py, in the form that Python gives it.
(function (ew) {
  "use strict";

  const ends = (span) => (span ? [span.low, span.mid, span.high] : [null, null, null]);
  const codes = (remarks) => remarks.map((remark) => remark.code);

  const asIs = (id) => id;

  function row(one) {
    return {
      film: [one.film, one.role, one.rank, one.hint, one.effects],
      words: [one.verdict, one.verdictByLook, one.ground, one.groundByLook],
      caps: codes(one.caps),
      lost: one.lost ? one.lost.code : null,
      numbers: [
        one.thicknessNm, ...ends(one.loss), ...ends(one.lossByLook),
        one.allowedNm === Infinity ? "any" : one.allowedNm, one.spentNm === Infinity ? "infinite" : one.spentNm,
      ],
      reason: ew.strings.reason(one, asIs),
      test: ew.strings.testPieceWords(one, ew.family(one.film), asIs),
    };
  }

  function option(one) {
    const times = one.schedule;
    return {
      recipe: one.recipe,
      etchant: one.etchant,
      words: [one.verdict, one.verdictByLook, one.mode, one.targetRank],
      flags: [one.proven, one.hasMargin],
      numbers: [
        ...ends(one.targetBand), times.nominalS, times.clearFirstS, times.clearLastS, times.firstLookS,
        times.latestStopS, ...ends(one.undercut), one.phi, one.offsetS, one.overetch,
      ],
      rows: one.rows.map(row),
      blocker: ew.strings.blocker(one, asIs),
      cleared: ew.strings.clearingWords(one, asIs),
      notes: one.notes.map((note) => ew.strings.noteWords(note, asIs)),
      unstated: codes(one.unstated),
    };
  }

  function stage(one) {
    return {
      step: one.step, target: one.target, treat: one.treat, options: one.options.map(option),
      excluded: one.excluded.map((left) => [left.recipe, left.etchant, ew.strings.excludedWords(left.reason, asIs)]),
    };
  }

  /** Answers to cases, each a sample file, a confidence and perhaps an etchant. */
  ew.answers = function (data, cases) {
    return cases.map(function (given) {
      const facts = given.etchant ? data.reference : data.facts;
      ew.family = (film) => facts.films[film].family;
      const sample = ew.sample.planSample(facts, given.sample);
      const steps = ew.sample.planSteps(facts, given.sample);
      return ew.planning.plan(facts, sample, steps, given.confidence, given.etchant).stages.map(stage);
    });
  };
})(globalThis.etchwright);
