// @ts-check
/* Makes elements. Text goes in as text only, so nothing that a sample or a record says is ever read as markup. */
(function (ew) {
  "use strict";

  const SVG = "http://www.w3.org/2000/svg";

  /** @typedef {Node | string | null | undefined | false} Child */

  /** @param {Element} element @param {{[name: string]: any}} given */
  function give(element, given) {
    for (const [name, value] of Object.entries(given)) {
      if (value === null || value === undefined || value === false) continue;
      if (name.startsWith("on")) element.addEventListener(name.slice(2), value);
      else if (name === "value") /** @type {any} */ (element).value = value;
      else element.setAttribute(name, value === true ? "" : String(value));
    }
  }

  /** What may stand inside an element; text as people read it. @param {any[]} children @returns {(Node | string)[]} */
  function readable(children) {
    return children.flat(Infinity).filter(Boolean).map((child) => (typeof child === "string" ? ew.numbers.inWords(child) : child));
  }

  /** An element with attributes (`class`, `onclick` as a function) and children. @param {string} tag @param {{[name: string]: any}} [given] @param {...(Child | Child[])} children @returns {any} */
  function el(tag, given, ...children) {
    const element = document.createElement(tag);
    element.append(...readable(children));
    give(element, given || {});
    return element;
  }

  /** @param {string} tag @param {{[name: string]: any}} [given] @param {...(Child | Child[])} children @returns {any} */
  function svg(tag, given, ...children) {
    const element = document.createElementNS(SVG, tag);
    element.append(...readable(children));
    give(element, given || {});
    return element;
  }

  /** A verdict: its mark and its word, as on every page. @param {string} verdict */
  function verdict(verdict) {
    const use = svg("use", { href: "#mark-" + verdict });
    const mark = svg("svg", { class: "ew-mark", width: 18, height: 12, "aria-hidden": "true", focusable: "false" }, use);
    return el("span", { class: "ew-verdict ew-verdict-" + verdict }, mark, verdict);
  }

  /** The fill of a family. @param {string} family */
  function swatch(family) {
    const ground = svg("rect", { class: "ew-tone-0", width: 22, height: 14 });
    const fill = svg("rect", { class: "ew-fill-" + family, width: 22, height: 14 });
    return svg("svg", { class: "ew-swatch", width: 22, height: 14, "aria-hidden": "true", focusable: "false" }, ground, fill);
  }

  /** A page of this site, seen from the planner's. @param {string} target @param {string} text */
  function link(target, text) {
    return el("a", { href: "../" + target }, text);
  }

  /** Puts new content into an element and gives the focus back to what had it. @param {Element} element @param {...(Child | Child[])} children */
  function fill(element, ...children) {
    const focused = document.activeElement && element.contains(document.activeElement) ? document.activeElement.id : "";
    element.replaceChildren(...readable(children));
    const again = focused ? document.getElementById(focused) : null;
    if (again) again.focus({ preventScroll: true });
  }

  ew.dom = Object.freeze({ el, svg, verdict, swatch, link, fill });
})((globalThis.etchwright = globalThis.etchwright || {}));
