// @ts-check
/*
 * From an exposure to a word: the loss, what is allowed, what caps it, what loses the film whatever its number.
 * Twin of builder/findings/plan/judging.py.
 */
(function (ew) {
  "use strict";

  /** Keys of remarks, made once for a remark that many rows share. @type {WeakMap<Remark, string>} */
  const KEYS = new WeakMap();
  const MASK_FAILURES = new Set(["peels", "swells", "cracks"]);

  /** @param {string} method */
  function inPlasma(method) {
    return method === "plasma" || method === "cyclic";
  }

  /**
   * The row of one film; `extra` caps and `coupleLost` come from couples.
   * @param {Reach} reach @param {Case} one @param {PlanCaps} plan @param {Remark[]} extra @param {Remark | null} coupleLost
   * @returns {FilmRow}
   */
  function judge(reach, one, plan, extra, coupleLost) {
    const known = ew.films.known(reach, one.film.film);
    const allowed = allowedLoss(reach, one);
    const bounds = { targetRank: plan.targetRank, allowed: allowed, lostAbove: lostAbove(reach, one) };
    const loss = lossOf(reach, one, known, one.byTimer);
    const lossLook = one.byLook === one.byTimer ? loss : lossOf(reach, one, known, one.byLook);
    const word = wordOf(reach, one, one.byTimer, known, loss, bounds);
    const wordLook = one.byLook === one.byTimer ? word : wordOf(reach, one, one.byLook, known, lossLook, bounds);
    const lost = coupleLost || lostOf(reach, one, known, plan.undercut);
    const lostLook = lost && lost.code === "line" ? lineLost(reach, plan.undercutByLook) : lost;
    /** @type {Remark[]} */
    const caps = [];
    for (const some of [one.caps, capsOf(reach, one, known, plan), plan.caps, extra]) addOrdered(caps, some);
    return {
      film: one.film.film, role: one.role, thicknessNm: one.film.thicknessNm, exposure: one.byTimer,
      exposureByLook: one.byLook,
      loss: loss, lossByLook: lossLook,
      allowedNm: allowed, verdict: finalWord(word, one.byTimer, caps, lost), verdictByLook: finalWord(wordLook, one.byLook, caps, lostLook),
      ground: word.ground, groundByLook: wordLook.ground, rank: known.rank, effects: known.adverse, caps: caps,
      lost: lost, hint: known.hint, assumed: one.film.assumed, spentNm: one.film.spentNm, sources: known.sources,
    };
  }

  /** What makes two remarks one, and their order. @param {Remark} remark @returns {string} */
  function keyOf(remark) {
    let key = KEYS.get(remark);
    if (key === undefined) KEYS.set(remark, (key = madeKey(remark)));
    return key;
  }

  /** @param {Remark} remark */
  function madeKey(remark) {
    const pairs = Object.keys(remark.params).sort(ew.couples.byCode);
    return remark.code + "\u0000" + pairs.map((name) => name + "=" + remark.params[name]).join(", ");
  }

  /** Are these remarks known to differ by their codes alone? It saves making keys. @param {Remark[]} remarks */
  function differByCode(remarks) {
    for (let place = 1; place < remarks.length; place += 1) {
      for (let before = 0; before < place; before += 1) if (remarks[before].code === remarks[place].code) return false;
    }
    return true;
  }

  /** @param {Remark[]} remarks @returns {Remark[]} */
  function distinctRemarks(remarks) {
    return differByCode(remarks) ? remarks : Array.from(new Map(remarks.map((one) => [keyOf(one), one])).values());
  }

  /** Put remarks into an ordered list, each once. @param {Remark[]} ordered @param {Remark[]} caps */
  function addOrdered(ordered, caps) {
    for (const cap of caps) {
      let place = ordered.length;
      let order = 1;
      while (place > 0 && (order = byKey(ordered[place - 1], cap)) > 0) place -= 1;
      if (place > 0 && order === 0) ordered[place - 1] = cap;
      else if (place === ordered.length) ordered.push(cap);
      else ordered.splice(place, 0, cap);
    }
  }

  /** Order of remarks by their keys, which are made only where two codes are the same. @param {Remark} one @param {Remark} other */
  function byKey(one, other) {
    if (one === other) return 0;
    const byCode = ew.couples.byCode;
    return byCode(one.code, other.code) || byCode(keyOf(one), keyOf(other));
  }

  /** What a film may still lose, nm: as stated, or by the lab's default; null where neither says. @param {Reach} reach @param {Case} one */
  function allowedLoss(reach, one) {
    const film = one.film;
    const least = leastMaskNm(reach, one);
    if (film.allowedNm === Infinity && least === Infinity) return Infinity;
    if (film.spentNm === null) return null;
    const stated = film.allowedNm === null ? defaultAllowance(reach, one, film.thicknessNm) : film.allowedNm;
    return stated === null ? null : Math.max(0, Math.min(stated, least) - film.spentNm);
  }

  /** The mask on the target protects no longer than its thinnest place lasts, whatever it may lose, nm. @param {Reach} reach @param {Case} one */
  function leastMaskNm(reach, one) {
    const protects = one.role === "mask" && reach.method !== "lift-off" && one.film === ew.films.masksOf(reach.stage)[0];
    return protects ? one.film.thicknessNm * (1 - one.film.tolerance) : Infinity;
  }

  /** @param {Reach} reach @param {Case} one @param {number} thickness @returns {number | null} */
  function defaultAllowance(reach, one, thickness) {
    const rules = reach.facts.defaults.allowance;
    if (one.film.assumed) return null;
    const isOrganic = ew.films.ORGANIC.has(reach.facts.films[one.film.film].family);
    return ew.words.allowedByDefault(rules, one.role, thickness, one.nextToTarget, isOrganic && inPlasma(reach.method));
  }

  /** @param {Reach} reach @param {Case} one @param {Evidence} known @param {Exposure | null} exposure */
  function lossOf(reach, one, known, exposure) {
    return ew.times.loss(known.band, exposure, reach.timing.cut.phi, one.faces);
  }

  /** The word of one film; of a family, the worst word of the films that may be meant. @param {Reach} reach @param {Case} one @param {Exposure | null} exposure @param {Evidence} known @param {Span} loss @param {Bounds} bounds @returns {Word} */
  function wordOf(reach, one, exposure, known, loss, bounds) {
    const film = reach.facts.films[one.film.film];
    const own = wordOfEvidence(exposure, known, loss, bounds);
    if (!film.is_family) return own;
    const words = ew.evidence
      .familyMembers(reach.facts, reach.etching, film, reach.asked)
      .map((/** @type {Evidence} */ member) => wordOfEvidence(exposure, member, lossOf(reach, one, member, exposure), bounds));
    return [...words, own].reduce((worst, word) => (ew.words.ORDER[word.verdict] > ew.words.ORDER[worst.verdict] ? word : worst));
  }

  /** @param {Exposure | null} exposure @param {Evidence} known @param {Span} loss @param {Bounds} bounds @returns {Word} */
  function wordOfEvidence(exposure, known, loss, bounds) {
    const anyLoss = bounds.allowed === Infinity;
    const grounds = {
      rank: known.rank, targetRank: bounds.targetRank, attacked: known.attacked, adverse: known.adverse.length > 0,
      limitS: known.limitS,
    };
    return ew.words.filmWord(loss, exposure, grounds, anyLoss ? null : bounds.allowed, bounds.lostAbove, anyLoss);
  }

  /** A film too thin for a default is not better off than the thinnest one that has a default. @param {Reach} reach @param {Case} one */
  function lostAbove(reach, one) {
    const left = Math.max(0, one.film.thicknessNm - (one.film.spentNm || 0));
    if (one.film.assumed) return left;
    const ofLeast = defaultAllowance(reach, one, reach.facts.defaults.allowance.none_below_nm);
    return ofLeast === null ? left : Math.min(left, ofLeast);
  }

  /** @param {Word} word @param {Exposure | null} exposure @param {Remark[]} caps @param {Remark | null} lost */
  function finalWord(word, exposure, caps, lost) {
    if (lost) return "lost";
    // What covers the back decides, and nobody said what does: neither safe nor lost.
    if (caps.some((cap) => cap.code === "back")) return exposure === null ? "unmeasured" : "borderline";
    return caps.length ? ew.words.capped(word.verdict) : word.verdict;
  }

  /** @param {Reach} reach @param {Case} one @param {Evidence} known @param {Span} undercut @returns {Remark | null} */
  function lostOf(reach, one, known, undercut) {
    if (one.role === "mask") {
      const failing = known.adverse.find((effect) => MASK_FAILURES.has(effect));
      if (failing) return ew.films.remark("mask-fails", { effect: failing });
      const line = lineLost(reach, undercut);
      if (line) return line;
    }
    if (one.film.isCritical && known.adverse.includes("roughens")) return ew.films.remark("roughened");
    return null;
  }

  /** A line etched under from both edges by its whole width stands on nothing. @param {Reach} reach @param {Span} undercut @returns {Remark | null} */
  function lineLost(reach, undercut) {
    const line = reach.stage.sample.lineNm;
    if (line === null || undercut.low === null || line > 2 * undercut.low) return null;
    return ew.films.remark("line", { line_nm: line, undercut_nm: undercut.low });
  }

  /** @param {Reach} reach @param {Case} one @param {Evidence} known @param {PlanCaps} plan */
  function capsOf(reach, one, known, plan) {
    const remark = ew.films.remark;
    const caps = [];
    if (known.adverse.length) caps.push(remark("adverse", { effect: known.adverse[0] }));
    if (known.conflict && known.single) caps.push(remark("conflict"));
    if (reach.facts.films[one.film.film].is_family) caps.push(remark("family"));
    if (one.film.spentNm === null) caps.push(remark("earlier-loss"));
    const inChamber = inPlasma(reach.method) || reach.method === "vapour";
    if (inChamber && known.rank === "literature" && plan.targetRank !== "own") caps.push(remark("published-chamber"));
    if (one.role === "mask") caps.push(...maskCaps(reach, one, plan));
    return caps;
  }

  /** @param {Reach} reach @param {Case} one @param {PlanCaps} plan */
  function maskCaps(reach, one, plan) {
    const caps = lineCaps(reach, plan.undercut);
    const recipe = reach.etching.recipe;
    if (!inPlasma(reach.method)) return [...caps, ...adhesionCaps(reach, one)];
    return recipe && recipe.cooled ? caps : [...caps, ew.films.remark("heat")];
  }

  /** @param {Reach} reach @param {Case} one */
  function adhesionCaps(reach, one) {
    const remark = ew.films.remark;
    const recipe = reach.etching.recipe;
    const stop = reach.timing.schedule.latestStopS;
    const held = (recipe ? recipe.masks : [])
      .filter((mask) => mask.film === one.film.film && one.liesOn !== null && mask.on.includes(one.liesOn))
      .map((mask) => mask.longest_s);
    const longest = held.length ? Math.max(...held) : 0;
    if (held.length && stop !== null && longest >= stop) return [];
    const on = one.liesOn || "";
    const caps = [
      held.length
        ? remark("adhesion-time", { on: on, held_s: longest, stop_s: stop })
        : remark("adhesion", { on: on }),
    ];
    // A mask that was seen to protect so long has shown that it lets nothing through.
    if (ew.films.isPorous(reach, one.film.film)) caps.push(remark("barrier", { film: one.film.film, under: on }));
    return caps;
  }

  /** @param {Reach} reach @param {Span} undercut @returns {Remark[]} */
  function lineCaps(reach, undercut) {
    const remark = ew.films.remark;
    const line = reach.stage.sample.lineNm;
    if (line === null || reach.method === "lift-off") return [];
    if (undercut.high === null) return [remark("undercut-unknown")];
    if (line <= 2 * undercut.high) return [remark("line", { line_nm: line, undercut_nm: undercut.high })];
    const recipe = reach.etching.recipe;
    return recipe && recipe.ratio ? [] : [remark("undercut-assumed")];
  }

  ew.judging = Object.freeze({ judge, distinctRemarks, inPlasma });
})((globalThis.etchwright = globalThis.etchwright || {}));
