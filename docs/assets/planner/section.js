// @ts-check
/*
 * The sample in section: where each layer is drawn and how high, to scale where it can be read, else with a break
 * mark. Pure geometry, SVG units; twin of builder/views/drawing/{heights,section}.py for what a plan needs.
 */
(function (ew) {
  "use strict";

  const WIDTH = 120;
  const OPENING = [40, 80];
  const ROOM = 124;
  const LEAST = 9;
  const BROKEN = 38;
  const TOO_THICK = 6;
  const WIDEST_UNDERCUT = 22;

  /** @typedef {{film: string, family: string, role: string, thicknessNm: number | null, left: number | null}} SectionLayer */
  /** @typedef {{layer: SectionLayer, index: number, top: number, bottom: number, tone: number, isCut: boolean, toScale: boolean}} Placed */

  /** @param {number} value */
  function tenth(value) {
    return Math.round(value * 10) / 10;
  }

  /** Drawn heights of layers of a thickness in nm (null: unknown). @param {(number | null)[]} thicknesses */
  function heights(thicknesses) {
    const known = thicknesses.filter((one) => one !== null);
    const thickest = Math.max(.../** @type {number[]} */ (known), 0);
    const rest = known.reduce((sum, one) => sum + one, 0) - thickest;
    const broken = known.length > 1 && thickest > TOO_THICK * rest ? thicknesses.lastIndexOf(thickest) : -1;
    const total = broken < 0 ? rest + thickest : rest;
    return thicknesses.map(function (thickness, index) {
      if (thickness === null || index === broken) return { height: BROKEN, toScale: false, isCut: true };
      const height = total > 0 ? (thickness * ROOM) / total : 0;
      return height >= LEAST ? { height: height, toScale: true, isCut: false } : { height: LEAST, toScale: false, isCut: false };
    });
  }

  /** Layers, top first, with their place. @param {SectionLayer[]} layers @param {number} top @returns {Placed[]} */
  function place(layers, top) {
    let at = top;
    const drawn = heights(layers.map((layer) => layer.thicknessNm));
    return layers.map(function (layer, index) {
      const placed = { layer: layer, index: index, top: at, bottom: at + drawn[index].height, tone: index % 2, isCut: drawn[index].isCut, toScale: drawn[index].toScale };
      at = placed.bottom;
      return placed;
    });
  }

  /** @param {number} left @param {number} top @param {number} right @param {number} bottom */
  function rectangle(left, top, right, bottom) {
    return "M" + left + " " + tenth(top) + "H" + right + "V" + tenth(bottom) + "H" + left + "Z";
  }

  /** Outlines of a layer before the etch; a mask has its opening. @param {Placed} placed @param {boolean} isOpen @returns {string[]} */
  function before(placed, isOpen) {
    const { top, bottom } = placed;
    if (!isOpen) return [rectangle(0, top, WIDTH, bottom)];
    return [rectangle(0, top, OPENING[0], bottom), rectangle(OPENING[1], top, WIDTH, bottom)];
  }

  /** Outlines of a layer after the etch. @param {Placed} placed @param {boolean} isMask @param {number} undercutRatio @returns {string[]} */
  function after(placed, isMask, undercutRatio) {
    const { top, bottom, layer } = placed;
    const height = bottom - top;
    const left = layer.left === null ? 1 : layer.left;
    // The back is wet all over, and goes from below.
    if (layer.role === "back") return left <= 0 ? [] : [rectangle(0, top, WIDTH, top + height * left)];
    if (isMask) {
      const worn = bottom - height * left;
      return left <= 0 ? [] : [rectangle(0, worn, OPENING[0], bottom), rectangle(OPENING[1], worn, WIDTH, bottom)];
    }
    if (left > 0) return [notched(placed, top + height * (1 - left))];
    const sideways = Math.min(height * undercutRatio, WIDEST_UNDERCUT);
    return [wall(placed, sideways, false), wall(placed, sideways, true)];
  }

  /** @param {Placed} placed @param {number} floor */
  function notched(placed, floor) {
    const notch = floor > placed.top ? "H" + OPENING[0] + "V" + tenth(floor) + "H" + OPENING[1] + "V" + tenth(placed.top) : "";
    return "M0 " + tenth(placed.top) + notch + "H" + WIDTH + "V" + tenth(placed.bottom) + "H0Z";
  }

  /** One side of a layer that is cut through, etched sideways at its top. @param {Placed} placed @param {number} sideways @param {boolean} mirrored */
  function wall(placed, sideways, mirrored) {
    const edge = mirrored ? OPENING[1] : OPENING[0];
    const outer = mirrored ? WIDTH : 0;
    const back = tenth(mirrored ? edge + sideways : edge - sideways);
    const arc = "A" + tenth(sideways) + " " + tenth(placed.bottom - placed.top) + " 0 0 " + (mirrored ? 1 : 0) + " " + edge + " " + tenth(placed.bottom);
    return "M" + outer + " " + tenth(placed.top) + "H" + back + arc + "H" + outer + "Z";
  }

  ew.section = Object.freeze({ place, before, after, tenth, WIDTH });
})((globalThis.etchwright = globalThis.etchwright || {}));
