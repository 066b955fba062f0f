// @ts-check
/* Draws a sample in section: as it is built, and before and after an etch. */
(function (ew) {
  "use strict";

  const TOP = 26;
  const GAP = 24;
  const LINE = 15;
  const LETTERS = 34;
  const BREAK_GAP = "M-3 1L15 -4L30 1L45 -4L60 1L75 -4L90 1L105 -4L123 1L123 5L105 0L90 5L75 0L60 5L45 0L30 5L15 0L-3 5Z";
  const BREAK = "M-3 1L15 -4L30 1L45 -4L60 1L75 -4L90 1L105 -4L123 1M-3 5L15 0L30 5L45 0L60 5L75 0L90 5L105 0L123 5";

  /** @param {any} placed @param {string[]} paths */
  function shapes(placed, paths) {
    const { svg } = ew.dom;
    const role = placed.layer.role === "back" ? "under" : placed.layer.role;
    return paths.flatMap((path) => [
      svg("path", { class: "ew-tone-" + placed.tone, d: path }),
      svg("path", { class: "ew-fill-" + placed.layer.family + " ew-role-" + role, d: path }),
    ]);
  }

  /** @param {any[]} placed @param {number} x */
  function breaks(placed, x) {
    const { svg } = ew.dom;
    return placed
      .filter((one) => one.isCut)
      .map((one) =>
        svg("g", { transform: "translate(" + x + " " + ew.section.tenth((one.top + one.bottom) / 2) + ")" },
          svg("path", { class: "ew-break-gap", d: BREAK_GAP }), svg("path", { class: "ew-break", d: BREAK })),
      );
  }

  /** A text in lines of at most so many letters, broken between words. @param {string} text @param {number} most */
  function lines(text, most) {
    /** @type {string[]} */
    const found = [];
    for (const word of text.split(" ")) {
      const last = found.length - 1;
      if (last >= 0 && (found[last] + " " + word).length <= most) found[last] += " " + word;
      else found.push(word);
    }
    return found;
  }

  /** Where labels go so that none overlaps, each with a line to its layer. @param {any[]} placed @param {(one: any) => string[]} text */
  function spread(placed, text) {
    let lowest = 0;
    return placed.map(function (one) {
      const middle = ew.section.tenth((one.top + one.bottom) / 2);
      const parts = text(one).flatMap((part) => lines(part, LETTERS));
      const y = ew.section.tenth(Math.max(middle - ((parts.length - 1) * LINE) / 2, lowest + LINE));
      lowest = y + (parts.length - 1) * LINE + 3;
      return { one: one, middle: middle, parts: parts, y: y };
    });
  }

  /** @param {any[]} spreadLabels @param {number} from */
  function labels(spreadLabels, from) {
    const { svg } = ew.dom;
    return spreadLabels.map(function ({ one, middle, parts, y }) {
      const role = one.layer.role === "back" ? "under" : one.layer.role;
      const x = from + 22;
      return [
        svg("path", { class: "ew-leader", d: "M" + (from + 3) + " " + middle + "L" + (from + 18) + " " + y }),
        svg("text", { class: "ew-label ew-label-" + role, x: x, y: y, dy: ".35em" },
          parts.map((/** @type {string} */ part, /** @type {number} */ line) => svg("tspan", { x: x, dy: line ? LINE : ".35em" }, part))),
      ];
    });
  }

  /** @param {any[]} placed @param {any[]} spreadLabels */
  function heightOf(placed, spreadLabels) {
    const last = spreadLabels[spreadLabels.length - 1];
    return ew.section.tenth(Math.max(placed[placed.length - 1].bottom, last.y + last.parts.length * LINE) + 6);
  }

  /** The sample as it is being built. @param {any[]} layers top first, with `name` and `thickness` as typed */
  function stack(layers) {
    const { svg } = ew.dom;
    if (!layers.length) return null;
    const placed = ew.section.place(layers, TOP - 12);
    const width = ew.section.WIDTH;
    const spreadLabels = spread(placed, (/** @type {any} */ one) => [one.layer.name, (one.layer.thickness || "how thick?") + (one.toScale || one.isCut ? "" : " (not to scale)")]);
    const words = layers.map((layer) => layer.name + ", " + (layer.thickness || "thickness not given") + ", " + layer.role);
    return svg("svg", { class: "ew-section", viewBox: "0 0 400 " + heightOf(placed, spreadLabels), role: "img", "aria-label": "Your sample in section, from the top: " + words.join("; ") },
      placed.flatMap((/** @type {any} */ one) => shapes(one, ew.section.before(one, one.layer.role === "mask"))),
      breaks(placed, 0),
      labels(spreadLabels, width));
  }

  /** @param {number} x @param {string} text */
  function panelName(x, text) {
    return ew.dom.svg("text", { class: "ew-panel-name", x: x, y: 14 }, text);
  }

  /** Before and after; `left` of each layer is the part that stays in the worst case. @param {any[]} layers @param {number} undercutRatio @param {string} description */
  function beforeAfter(layers, undercutRatio, description) {
    const { svg } = ew.dom;
    const placed = ew.section.place(layers, TOP);
    const second = ew.section.WIDTH + GAP;
    const isMask = (/** @type {any} */ one) => one.layer.role === "mask";
    const spreadLabels = spread(placed, (/** @type {any} */ one) => [one.layer.name, one.layer.remark]);
    return svg("svg", { class: "ew-section", viewBox: "0 0 520 " + heightOf(placed, spreadLabels), role: "img", "aria-label": description },
      panelName(0, "before"), panelName(second, "after, at worst"),
      placed.flatMap((/** @type {any} */ one) => shapes(one, ew.section.before(one, isMask(one)))),
      svg("g", { transform: "translate(" + second + " 0)" },
        placed.flatMap((/** @type {any} */ one) => shapes(one, ew.section.after(one, isMask(one), undercutRatio)))),
      breaks(placed, 0), breaks(placed, second),
      labels(spreadLabels, second + ew.section.WIDTH));
  }

  ew.viewSection = Object.freeze({ stack, beforeAfter });
})((globalThis.etchwright = globalThis.etchwright || {}));
