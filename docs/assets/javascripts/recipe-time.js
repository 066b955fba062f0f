// @ts-check
/*
 * The time for a typed depth on a recipe's page: first look and latest stop. The arithmetic is that of
 * builder/engine/timing.py, from the ends of the next run in the script element "ew-times" (nm, s,
 * fractions). Without JavaScript the field stays hidden, and the table of stated depths serves instead.
 */
(function () {
  "use strict";
  const FIRST_LOOK_FRACTION = 0.8;
  const NO_BREAK = "\u00a0";

  /** First look and latest stop, s, for a film of this thickness (nm) that is removed to its end. */
  function times(target, depthNm) {
    const fast = target.high === null ? 0
      : depthNm * (1 - target.tolerance) / (target.high * (1 + target.phi)) + target.offset_s;
    const slow = depthNm * (1 + target.tolerance) / (target.low * (1 - target.phi));
    return {
      first: FIRST_LOOK_FRACTION * Math.max(0, fast),
      latest: Math.max(0, slow * (1 + target.overetch) + target.offset_s),
    };
  }

  /** Seconds as people set timers, rounded by `round` (Math.floor or Math.ceil) to a step that suits. */
  function timeText(seconds, round) {
    const steps = [[10, 0.1], [120, 1], [600, 5], [3600, 10], [Infinity, 60]];
    const step = steps.find(function (one) { return seconds < one[0]; })[1];
    const count = round(Number((seconds / step).toPrecision(12)));
    if (step < 1) return (count ? (count / 10).toFixed(1) : "0") + NO_BREAK + "s";
    let left = count * step;
    const parts = [];
    [[3600, "h"], [60, "min"], [1, "s"]].forEach(function (unit) {
      const whole = Math.floor(left / unit[0]);
      left -= whole * unit[0];
      if (whole) parts.push(whole + NO_BREAK + unit[1]);
    });
    return parts.length ? parts.join(NO_BREAK) : "0" + NO_BREAK + "s";
  }

  /** A typed number, with comma or point; NaN where it is none, or not above 0. */
  function depthOf(text) {
    const plain = text.trim().replace(",", ".");
    const value = /^\d*\.?\d+(e[+-]?\d+)?$|^\d+\.$/i.test(plain) ? Number(plain) : NaN;
    return value > 0 ? value : NaN;
  }

  /** What is shown for a typed depth: the two times, and a sentence that is read out. */
  function answer(target, text, sizeNm) {
    if (!text.trim()) return { words: "" };
    const depth = depthOf(text) * sizeNm;
    if (!(depth > 0 && depth < Infinity)) return { words: "Type the thickness as a number above 0." };
    const found = times(target, depth);
    const first = timeText(found.first, Math.floor);
    const latest = timeText(found.latest, Math.ceil);
    return { first: first, latest: latest, words: "First look at " + first + ", latest stop at " + latest + "." };
  }

  function start(form, data) {
    const value = form.querySelector("[data-ew-depth-value]");
    const unit = form.querySelector("[data-ew-depth-unit]");
    const film = form.querySelector("[data-ew-depth-film]");
    const shown = form.querySelector("[data-ew-depth-answer]");
    // The large numbers follow, or they would tell the time of another depth; without a depth they come back.
    const large = ["first", "latest", "for"].map(function (name) {
      const place = document.querySelector("[data-ew-" + name + "]");
      return place && { name: name, place: place, usual: place.textContent };
    }).filter(Boolean);

    function show() {
      const found = answer(data.targets[film ? Number(film.value) : 0], value.value, Number(unit.value));
      found.for = value.value.trim() + NO_BREAK + unit.selectedOptions[0].text
        + (film ? " of " + film.selectedOptions[0].text : "");
      shown.textContent = found.words;
      large.forEach(function (one) { one.place.textContent = found.first ? found[one.name] : one.usual; });
    }
    form.addEventListener("submit", function (event) { event.preventDefault(); });
    form.addEventListener("input", show);
    form.addEventListener("change", show);
    form.hidden = false;
    show();
  }

  const form = document.querySelector("form[data-ew-depth]");
  const source = document.getElementById("ew-times");
  if (form && source) {
    const data = JSON.parse(source.textContent || "{}");
    if (data.format === 1 && data.targets.length) start(form, data);
  }
})();
