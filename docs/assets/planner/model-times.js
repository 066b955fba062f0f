// @ts-check
/*
 * When a target clears, how long each film is exposed, and what it loses: seconds, nm, nm/s.
 * Twin of builder/engine/{timing,loss}.py.
 */
(function (ew) {
  "use strict";

  /** @type {Schedule} */
  const UNKNOWN_SCHEDULE = Object.freeze({
    nominalS: null, clearFirstS: null, clearLastS: null, firstLookS: null, latestStopS: null,
    openFirstS: null, openMidS: null, openLastS: null,
  });
  /** @type {Span} */
  const UNKNOWN_SPAN = Object.freeze({ low: null, mid: null, high: null });

  /** Time of the fastest place; 0 where no high end is known. @param {number} depth @param {Band} band @param {Cut} cut */
  function fast(depth, band, cut) {
    return band.high === null ? 0 : depth / (band.high * (1 + cut.phi)) + cut.offsetS;
  }

  /** @param {number} depth @param {Band} band @param {Cut} cut */
  function slow(depth, band, cut) {
    return depth / (band.low * (1 - cut.phi)) + cut.offsetS;
  }

  /** @param {number} depth @param {Band} band @param {Cut} cut */
  function likely(depth, band, cut) {
    return band.mid === null ? null : Math.max(0, depth / band.mid + cut.offsetS);
  }

  /**
   * Clearing times, first look and latest stop. Without a high end the first look is at once; without a
   * positive low end no latest stop exists, and everything is unknown.
   * @param {Facts} facts @param {Band | null} band @param {Cut} cut @returns {Schedule}
   */
  function schedule(facts, band, cut) {
    if (band === null || band.low <= 0) return UNKNOWN_SCHEDULE;
    const tolerance = cut.through ? cut.tolerance : 0;
    const last = slow(cut.depthNm * (1 + tolerance), band, cut);
    const first = fast(cut.depthNm * (1 - tolerance), band, cut);
    return {
      nominalS: likely(cut.depthNm, band, cut),
      clearFirstS: Math.max(0, first),
      clearLastS: Math.max(0, last),
      firstLookS: facts.rules.first_look_fraction * Math.max(0, first),
      latestStopS: Math.max(0, (last - cut.offsetS) * (1 + cut.overetch) + cut.offsetS),
      openFirstS: Math.max(0, fast(cut.thicknessNm * (1 - cut.tolerance), band, cut)),
      openMidS: likely(cut.thicknessNm, band, cut),
      openLastS: Math.max(0, slow(cut.thicknessNm * (1 + cut.tolerance), band, cut)),
    };
  }

  /** @param {Facts} facts @param {Schedule} plan @param {boolean} holdsByTimer @param {boolean} endpoint */
  function endMode(facts, plan, holdsByTimer, endpoint) {
    if (plan.clearFirstS === null || plan.clearLastS === null) return null;
    const narrow = plan.clearFirstS > 0 && plan.clearLastS <= facts.rules.timed_ratio * plan.clearFirstS;
    return holdsByTimer || endpoint || narrow ? "run-to-time" : "look-and-finish";
  }

  /** A film open from the start, until the latest stop. @param {Schedule} plan @returns {Exposure | null} */
  function openByTimer(plan) {
    const stop = plan.latestStopS;
    return stop === null ? null : { lowS: stop, midS: stop, highS: stop };
  }

  /** @param {Schedule} plan @param {Cut} cut @returns {Exposure | null} */
  function openByLook(plan, cut) {
    if (plan.clearFirstS === null || plan.clearLastS === null) return null;
    const mid = plan.nominalS === null ? null : plan.nominalS + cut.reactionS;
    return { lowS: plan.clearFirstS + cut.reactionS, midS: mid, highS: plan.clearLastS + cut.reactionS };
  }

  /** The film below the target, until the latest stop. @param {Schedule} plan @returns {Exposure | null} */
  function underByTimer(plan) {
    const stop = plan.latestStopS;
    if (stop === null || plan.openFirstS === null || plan.openLastS === null) return null;
    return {
      lowS: Math.max(0, stop - plan.openLastS),
      midS: plan.openMidS === null ? null : Math.max(0, stop - plan.openMidS),
      highS: Math.max(0, stop - plan.openFirstS),
    };
  }

  /** Only the unevenness within the wafer counts, and the time to react. @param {Band | null} band @param {Schedule} plan @param {Cut} cut @returns {Exposure | null} */
  function underByLook(band, plan, cut) {
    if (!cut.through || band === null || band.low <= 0) return underByTimer(plan);
    const spread = cut.thicknessNm * ((1 + cut.tolerance) / (1 - cut.phi) - (1 - cut.tolerance) / (1 + cut.phi));
    return {
      lowS: cut.reactionS + (band.high === null ? 0 : spread / band.high),
      midS: band.mid === null ? null : cut.reactionS + spread / band.mid,
      highS: cut.reactionS + spread / band.low,
    };
  }

  /**
   * Exposure of the layer below one that is itself exposed: it starts when that one is gone, or at once
   * where that one lets the etchant through or nothing bounds its rate.
   * @param {Exposure} exposure @param {Band | null} band @param {number} thickness @param {number} tolerance
   * @param {number} phi @param {boolean} porous @returns {Exposure}
   */
  function below(exposure, band, thickness, tolerance, phi, porous) {
    let high = exposure.highS;
    if (!porous && band !== null && band.high !== null) {
      const fastest = band.high * (1 + phi);
      high = fastest <= 0 ? 0 : Math.max(0, high - (thickness * (1 - tolerance)) / fastest);
    }
    const slowest = band === null ? 0 : band.low * (1 - phi);
    const low = slowest <= 0 ? 0 : Math.max(0, exposure.lowS - (thickness * (1 + tolerance)) / slowest);
    const knowsMid = exposure.midS !== null && band !== null && band.mid !== null && band.mid > 0;
    const mid = knowsMid ? Math.max(0, /** @type {number} */ (exposure.midS) - thickness / /** @type {any} */ (band).mid) : null;
    return { lowS: low, midS: mid, highS: high };
  }

  /** Thickness lost, nm; not cut off at the film's thickness. @param {Band | null} band @param {Exposure | null} exposure @param {number} phi @param {number} faces @returns {Span} */
  function loss(band, exposure, phi, faces) {
    if (band === null || exposure === null) return UNKNOWN_SPAN;
    return {
      low: band.low * (1 - phi) * exposure.lowS * faces,
      mid: band.mid === null || exposure.midS === null ? null : band.mid * exposure.midS * faces,
      high: band.high === null ? null : band.high * (1 + phi) * exposure.highS * faces,
    };
  }

  /** An exposure less the time in which nothing is etched. @param {Exposure | null} exposure @param {number} offsetS @returns {Exposure | null} */
  function withoutOffset(exposure, offsetS) {
    if (exposure === null) return null;
    return {
      lowS: Math.max(0, exposure.lowS - offsetS),
      midS: exposure.midS === null ? null : Math.max(0, exposure.midS - offsetS),
      highS: Math.max(0, exposure.highS - offsetS),
    };
  }

  /** A rate sideways: each end of the rate times that of the ratio. @param {Band | null} band @param {Span} ratio @returns {Band | null} */
  function scaled(band, ratio) {
    if (band === null || ratio.low === null) return null;
    return {
      low: band.low * ratio.low,
      mid: band.mid === null || ratio.mid === null ? null : band.mid * ratio.mid,
      high: band.high === null || ratio.high === null ? null : band.high * ratio.high,
    };
  }

  ew.times = Object.freeze({
    UNKNOWN_SCHEDULE, UNKNOWN_SPAN, schedule, endMode, openByTimer, openByLook, underByTimer, underByLook,
    below, loss, withoutOffset, scaled,
  });
})((globalThis.etchwright = globalThis.etchwright || {}));
