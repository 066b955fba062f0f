// @ts-check
/*
 * Which films of a sample an etch reaches, and for how long, by the timer and by looking.
 * Twin of builder/findings/plan/exposures.py.
 */
(function (ew) {
  "use strict";

  const ORGANIC = new Set(["resist", "polymer"]);
  /** Thickness taken for an adhesion layer that nobody named. Common practice, no source. */
  const IMPLIED_ADHESION_NM = 10;

  /** @type {Remark[]} */
  const NO_CAPS = /** @type {any} */ (Object.freeze([]));
  const NO_PARAMS = Object.freeze({});
  /** @type {Partial<Case>} */
  const PLAIN = Object.freeze({});

  /** @param {string} code @param {{[name: string]: any}} [params] @returns {Remark} */
  function remark(code, params) {
    return { code: code, params: params || NO_PARAMS };
  }

  /** A film with some of it changed. @param {PlanFilm} film @param {Partial<PlanFilm>} change @returns {PlanFilm} */
  function changed(film, change) {
    return Object.assign({}, film, change);
  }

  /**
   * What decides where an etch gets: facts, the etch, what is asked, the stage and its times.
   * @param {Facts} facts @param {Etching} etching @param {Asked} asked @param {Stage} stage @param {Timing} timing
   * @returns {Reach}
   */
  function reaching(facts, etching, asked, stage, timing) {
    const state = etching.etchant.state;
    const isWet = state === "liquid";
    const transferS = etching.recipe ? etching.recipe.transfer_s : 0;
    return {
      facts: facts, etching: etching, asked: asked, stage: stage, timing: timing,
      method: etching.recipe ? etching.recipe.method : etching.etchant.method,
      isWet: isWet,
      passesPores: isWet || etching.etchant.hf_vapour,
      reachesBack: isWet || state === "vapour",
      startTimer: longer(ew.times.openByTimer(timing.schedule), transferS),
      startLook: longer(ew.times.openByLook(timing.schedule, timing.cut), transferS),
    };
  }

  /** @param {Reach} reach @param {string} film @returns {Evidence} */
  function known(reach, film) {
    return ew.evidence.evidence(reach.facts, reach.etching, film, reach.asked);
  }

  /** @param {Reach} reach @param {string} film */
  function isPorous(reach, film) {
    return reach.passesPores && reach.facts.films[film].barrier !== "dense";
  }

  /** Every film that should stay and that the etch reaches, or may reach. @param {Reach} reach @returns {Case[]} */
  function cases(reach) {
    return around(reach).concat(under(reach)).filter((one) => one.role !== "target" && isReached(one));
  }

  /** Targets of later stages that the etch reaches, or may reach, in its overetch. @param {Reach} reach @returns {Case[]} */
  function laterTargets(reach) {
    if (!reach.stage.below.some((film) => film.role === "target")) return [];
    return under(reach).filter((one) => one.role === "target" && isReached(one));
  }

  /**
   * Every film that a treatment of fixed time reaches: `openFilms` lie in the windows, top first.
   * @param {Reach} reach @param {PlanFilm[]} openFilms @param {boolean} leavesMasks @returns {Case[]}
   */
  function casesOfTreatment(reach, openFilms, leavesMasks) {
    let timer = reach.startTimer;
    let look = reach.startLook;
    const found = around(reach).filter(
      (one) => leavesMasks || one.role !== "mask" || !ORGANIC.has(reach.facts.films[one.film.film].family),
    );
    openFilms.forEach(function (film, place) {
      const liesOn = place + 1 < openFilms.length ? openFilms[place + 1].film : null;
      found.push(makeCase(changed(film, { role: "under" }), "under", timer, look, { liesOn: liesOn }));
      [timer, look] = beneath(reach, film, timer, look);
    });
    return found.filter(isReached);
  }

  /** @param {Reach} reach */
  function around(reach) {
    return masks(reach).concat(edgesOfEarlierTargets(reach), exposed(reach), back(reach));
  }

  /** An exposure of nothing in the worst case is no exposure; one that nobody knows may be any. @param {Case} one */
  function isReached(one) {
    return one.byTimer === null || one.byTimer.highS > 0;
  }

  /** @param {PlanFilm} film @param {string} role @param {Exposure | null} byTimer @param {Exposure | null} byLook @param {Partial<Case>} [more] @returns {Case} */
  function makeCase(film, role, byTimer, byLook, more) {
    const { faces = 1, nextToTarget = false, liesOn = null, caps = NO_CAPS } = more || PLAIN;
    return { film: film, role: role, byTimer: byTimer, byLook: byLook, faces: faces, nextToTarget: nextToTarget, liesOn: liesOn, caps: caps };
  }

  /** @param {Stage} stage */
  function masksOf(stage) {
    return stage.above.filter((film) => film.role === "mask");
  }

  /** Top mask first exposed; a mask below another is reached when that one is gone. @param {Reach} reach @returns {Case[]} */
  function masks(reach) {
    /** @type {Case[]} */
    const found = [];
    let timer = reach.startTimer;
    let look = reach.startLook;
    const order = masksOf(reach.stage).reverse();
    order.forEach(function (mask, place) {
      const isLast = place + 1 === order.length;
      const liesOn = isLast ? reach.stage.target.film : order[place + 1].film;
      found.push(makeCase(mask, "mask", timer, look, { liesOn: liesOn }));
      [timer, look] = beneath(reach, mask, timer, look);
      if (isLast && reach.facts.films[mask.film].noble) found.push(...underNoble(reach, mask, liesOn));
    });
    return found;
  }

  /** Targets of earlier stages: under a mask their edges stand in this etch. @param {Reach} reach @returns {Case[]} */
  function edgesOfEarlierTargets(reach) {
    if (!masksOf(reach.stage).length) return [];
    return reach.stage.above
      .filter((film) => film.role === "target")
      .map((film) =>
        makeCase(changed(film, { role: "exposed", exposed: "sidewall" }), "exposed", reach.startTimer, reach.startLook),
      );
  }

  /** Films below the target, each reached when the one above is gone, or sideways from an open edge. @param {Reach} reach @returns {Case[]} */
  function under(reach) {
    /** @type {Case[]} */
    const found = [];
    const { target, below, sample } = reach.stage;
    let timer = ew.times.underByTimer(reach.timing.schedule);
    let look = ew.times.underByLook(reach.timing.band, reach.timing.schedule, reach.timing.cut);
    if (isPorous(reach, target.film)) {
      timer = atOnce(timer, reach.startTimer);
      look = atOnce(look, reach.startLook);
    }
    below.forEach(function (film, place) {
      const liesOn = place + 1 < below.length ? below[place + 1].film : null;
      const isOpen = reach.reachesBack && sample.edge === "open";
      const here = isOpen ? [fromEdge(timer, reach.startTimer), fromEdge(look, reach.startLook)] : [timer, look];
      const caps = reach.reachesBack && sample.edge === null ? [remark("edge")] : [];
      const isKept = film.role !== "target";
      const more = { nextToTarget: place === 0, liesOn: liesOn, caps: caps };
      found.push(makeCase(film, isKept ? "under" : "target", here[0], here[1], more));
      if (isKept) {
        if (reach.facts.films[film.film].noble) found.push(...underNoble(reach, film, liesOn));
      }
      [timer, look] = beneath(reach, film, here[0], here[1]);
    });
    return found;
  }

  /** Films anywhere else in reach, with what lies under them where the etch gets there. @param {Reach} reach @returns {Case[]} */
  function exposed(reach) {
    /** @type {Case[]} */
    const found = [];
    const sample = reach.stage.sample;
    const isIn = (/** @type {PlanFilm[]} */ films, /** @type {string} */ id) => films.some((film) => film.film === id);
    for (const film of sample.exposed) {
      const faces = film.exposed === "both-faces" ? reach.facts.rules.two_faces : 1;
      found.push(makeCase(film, "exposed", reach.startTimer, reach.startLook, { faces: faces, liesOn: film.on }));
      // The film that a pad stands on: its edge is open all round the pad.
      const inStack = film.on !== null && isIn(sample.layers, film.on);
      if (film.on !== null && film.on !== "none" && !inStack && !isIn(sample.exposed, film.on)) found.push(thinCase(reach, film.on, []));
      else if (film.on !== null && inStack) found.push(thinCase(reach, film.on, [], isPorous(reach, film.film) ? null : film));
      if (reach.facts.films[film.film].noble) found.push(...underNoble(reach, film, film.on));
    }
    return found;
  }

  /** What lies under a film: wet from the edge at once, or, in a stack, when the `pad` on it is gone. @param {Reach} reach @param {string} film @param {Remark[]} caps @param {PlanFilm | null} [pad] */
  function thinCase(reach, film, caps, pad) {
    const start = [reach.startTimer, reach.startLook];
    const [timer, look] = pad ? beneath(reach, pad, start[0], start[1]) : start;
    /** @type {PlanFilm} */
    const thin = {
      film: film, thicknessNm: IMPLIED_ADHESION_NM, role: "exposed", tolerance: 0, allowedNm: null, on: null,
      isCritical: false, exposed: "sidewall", spentNm: 0, assumed: true,
    };
    return makeCase(thin, "exposed", timer, look, { caps: caps });
  }

  /** The usual adhesion layers of a noble metal, where nobody said what is under it. @param {Reach} reach @param {PlanFilm} film @param {string | null} liesOn @returns {Case[]} */
  function underNoble(reach, film, liesOn) {
    const films = reach.facts.films;
    const usual = films[film.film].adhesion;
    if (!reach.passesPores || !usual.length || film.on !== null) return [];
    if (liesOn !== null && (usual.includes(liesOn) || films[liesOn].electrical === "metal")) return [];
    return usual
      .filter((layer) => ew.evidence.at(films, layer))
      .map((layer) => thinCase(reach, layer, [remark("under-noble", { film: film.film, layer: layer })]));
  }

  /** @param {Reach} reach @returns {Case[]} */
  function back(reach) {
    const sample = reach.stage.sample;
    if (!reach.reachesBack || sample.backProtected) return [];
    const bottom = sample.layers[sample.layers.length - 1];
    const { startTimer, startLook } = reach;
    if (sample.back === null) {
      const unknown = changed(bottom, { role: "back", allowedNm: null, assumed: true, exposed: "face" });
      return [makeCase(unknown, "back", startTimer, startLook, { caps: [remark("back", { film: bottom.film })] })];
    }
    const found = [makeCase(sample.back, "back", startTimer, startLook, { liesOn: bottom.film })];
    if (bottom.role !== "target" && bottom.film !== sample.back.film) {
      const beneathBack = beneath(reach, sample.back, startTimer, startLook);
      found.push(makeCase(changed(bottom, { role: "back" }), "back", beneathBack[0], beneathBack[1]));
    }
    return found;
  }

  /**
   * Exposure of what lies below a film that is itself exposed so long.
   * @param {Reach} reach @param {PlanFilm} film @param {Exposure | null} timer @param {Exposure | null} look
   * @returns {[Exposure | null, Exposure | null]}
   */
  function beneath(reach, film, timer, look) {
    const band = known(reach, film.film).band;
    const porous = isPorous(reach, film.film);
    const phi = reach.timing.cut.phi;
    const thickness = film.spentNm === null ? 0 : Math.max(0, film.thicknessNm - film.spentNm);
    const below = timer === null ? null : ew.times.below(timer, band, thickness, film.tolerance, phi, porous);
    if (look === timer) return [below, below];
    return [below, look === null ? null : ew.times.below(look, band, thickness, film.tolerance, phi, porous)];
  }

  /** @param {Exposure | null} exposure @param {number} byS @returns {Exposure | null} */
  function longer(exposure, byS) {
    if (exposure === null) return null;
    const mid = exposure.midS === null ? null : exposure.midS + byS;
    return { lowS: exposure.lowS + byS, midS: mid, highS: exposure.highS + byS };
  }

  /** In the worst case from the start. @param {Exposure | null} exposure @param {Exposure | null} start @returns {Exposure | null} */
  function atOnce(exposure, start) {
    if (exposure === null || start === null) return null;
    return { lowS: exposure.lowS, midS: exposure.midS, highS: Math.max(exposure.highS, start.highS) };
  }

  /** At an open edge a film is in the etch from the start. @param {Exposure | null} exposure @param {Exposure | null} start */
  function fromEdge(exposure, start) {
    return exposure === null || start === null ? null : start;
  }

  ew.films = Object.freeze({ ORGANIC, remark, changed, reaching, known, isPorous, masksOf, cases, laterTargets, casesOfTreatment });
})((globalThis.etchwright = globalThis.etchwright || {}));
