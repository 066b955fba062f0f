// @ts-check
/*
 * How a loss and its grounds become one of the four words, and what a film may lose when nobody has said.
 * Twin of builder/engine/{verdict,allowed}.py.
 */
(function (ew) {
  "use strict";

  /** The words, best first. A plan has its worst film's word. */
  const WORDS = ["holds", "borderline", "unmeasured", "lost"];
  /** @type {{[word: string]: number}} */
  const ORDER = Object.freeze({ holds: 0, borderline: 1, unmeasured: 2, lost: 3 });

  /** @param {string} one @param {string} other */
  function worse(one, other) {
    return ORDER[one] >= ORDER[other] ? one : other;
  }

  /** The worst of several words, and never better than `best`. @param {string[]} words @param {string} best */
  function worst(words, best) {
    return words.reduce(worse, best);
  }

  /** A caution takes "holds" to "borderline" and changes no other word. @param {string} word */
  function capped(word) {
    return word === "holds" ? "borderline" : word;
  }

  /**
   * The word for one film. Nothing unmeasured becomes "holds": each way to that word passes a number of rank
   * own or literature for the film, the same for the target, a high end, and an allowance.
   * @param {Span} lost @param {Exposure | null} exposure @param {Grounds} grounds @param {number | null} allowed
   * @param {number} lostAbove @param {boolean} anyLoss @returns {Word}
   */
  function filmWord(lost, exposure, grounds, allowed, lostAbove, anyLoss) {
    if (grounds.rank === "statement" || exposure === null) return withoutNumber(exposure, grounds);
    if (!ew.evidence.hasNumber(grounds.rank)) return { verdict: "unmeasured", ground: "no-evidence" };
    if (anyLoss) return ranked(grounds, exposure, "any-loss-accepted");
    if (lost.low !== null && lost.low > (allowed === null ? lostAbove : allowed)) {
      return { verdict: "lost", ground: "mild-end-exceeds" };
    }
    if (lost.high === null) return { verdict: "borderline", ground: "no-high-end" };
    if (allowed === null) return { verdict: "borderline", ground: "no-allowance" };
    if (lost.high > allowed) return { verdict: "borderline", ground: "straddles" };
    return ranked(grounds, exposure, "within-allowed");
  }

  /** @param {Exposure | null} exposure @param {Grounds} grounds @returns {Word} */
  function withoutNumber(exposure, grounds) {
    if (grounds.attacked) return { verdict: "lost", ground: "statement-attacks" };
    if (exposure === null) return { verdict: "unmeasured", ground: "time-unknown" };
    return { verdict: "borderline", ground: grounds.adverse ? "statement-adverse" : "statement-resists" };
  }

  /** @param {Grounds} grounds @param {Exposure} exposure @param {string} good @returns {Word} */
  function ranked(grounds, exposure, good) {
    const canHold = ew.evidence.canHold;
    if (!canHold(ew.evidence.worstRank(grounds.rank, grounds.targetRank))) {
      return { verdict: "borderline", ground: canHold(grounds.rank) ? "target-unchecked" : "unchecked" };
    }
    if (grounds.limitS !== null && exposure.highS > grounds.limitS) {
      return { verdict: "borderline", ground: "beyond-tested-time" };
    }
    return { verdict: "holds", ground: good };
  }

  /** @param {number} thickness @param {Allowance} rules */
  function allowedUnder(thickness, rules) {
    return thickness < rules.none_below_nm ? null : Math.min(rules.under_fraction * thickness, rules.under_nm);
  }

  /** @param {number} thickness @param {Allowance} rules */
  function allowedOther(thickness, rules) {
    if (thickness < rules.none_below_nm) return null;
    return Math.max(rules.other_least_nm, Math.min(rules.other_fraction * thickness, rules.other_nm));
  }

  /** What a mask may lose above its reserve. @param {number} thickness @param {Allowance} rules @param {boolean} resistInPlasma */
  function allowedMask(thickness, rules, resistInPlasma) {
    if (thickness < rules.none_below_nm) return null;
    const reserve = resistInPlasma
      ? Math.max(rules.reserve_resist_plasma_fraction * thickness, rules.reserve_resist_plasma_nm)
      : Math.max(rules.reserve_fraction * thickness, rules.reserve_nm);
    return Math.max(0, thickness - reserve);
  }

  /** What a film may lose when nobody has said. @param {Allowance} rules @param {string} role @param {number} thickness @param {boolean} nextToTarget @param {boolean} resistInPlasma */
  function allowedByDefault(rules, role, thickness, nextToTarget, resistInPlasma) {
    if (role === "mask") return allowedMask(thickness, rules, resistInPlasma);
    return nextToTarget ? allowedUnder(thickness, rules) : allowedOther(thickness, rules);
  }

  ew.words = Object.freeze({ WORDS, ORDER, worst, worse, capped, filmWord, allowedByDefault });
})((globalThis.etchwright = globalThis.etchwright || {}));
