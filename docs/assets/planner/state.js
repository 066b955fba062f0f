// @ts-check
/*
 * What the page knows: the sample as typed, and what the reader looks at. Every change is an action; `after` makes
 * the next state of the last one and never changes either. Pure.
 */
(function (ew) {
  "use strict";

  /** Options drawn at first, and how many more each time. */
  const DRAWN = 20;

  /**
   * @typedef {Object} State
   * @property {any} file the sample file, blank fields left out
   * @property {number} confidence
   * @property {string | null} etchant an etchant asked for alone
   * @property {string[]} open keys of the options that are open
   * @property {number} drawn options drawn of each stage
   * @property {string | null} card key of the option whose run card is shown
   * @property {string[]} notices what could not be restored or read
   * @property {number} revision changes whenever the form has to be built anew
   */

  /** @typedef {{type: string, field?: string, value?: any, list?: string, index?: number, by?: number, key?: string, notices?: string[], confidence?: number | null, etchant?: string | null}} Action */

  /** @param {number} confidence @returns {State} */
  function initial(confidence) {
    return { file: ew.sampleFile.empty(), confidence: confidence, etchant: null, open: [], drawn: DRAWN, card: null, notices: [], revision: 0 };
  }

  /** A copy of a nested value with one field set, or taken out where the value is blank. @param {any} whole @param {string[]} path @param {any} value @returns {any} */
  function withField(whole, path, value) {
    const [name, ...rest] = path;
    const copy = Array.isArray(whole) ? whole.slice() : Object.assign({}, whole);
    const key = Array.isArray(copy) ? Number(name) : name;
    if (rest.length) copy[key] = withField(copy[key] === undefined ? {} : copy[key], rest, value);
    else if (value === "" || value === undefined) delete copy[key];
    else copy[key] = value;
    if (rest.length && !Array.isArray(copy[key]) && Object.keys(copy[key]).length === 0) delete copy[key];
    return copy;
  }

  /** @param {any[]} list @param {number} index @param {number} by */
  function moved(list, index, by) {
    const to = index + by;
    if (to < 0 || to >= list.length) return list;
    const copy = list.slice();
    copy.splice(to, 0, ...copy.splice(index, 1));
    return copy;
  }

  /** @param {State} state @param {string} list @param {any[]} items */
  function withList(state, list, items) {
    const file = Object.assign({}, state.file);
    if (items.length || list === "layers") file[list] = items;
    else delete file[list];
    return Object.assign({}, state, { file: file, revision: state.revision + 1, card: null });
  }

  /** @type {{[type: string]: (state: State, action: any) => State}} */
  const CHANGES = {
    set: (state, action) => {
      const file = withField(state.file, action.field.split("/"), action.value);
      return Object.assign({}, state, { file: file, card: null, revision: state.revision + (action.rebuild ? 1 : 0) });
    },
    add: (state, action) => withList(state, action.list, [...(state.file[action.list] || []), action.value]),
    remove: (state, action) => withList(state, action.list, state.file[action.list].filter((/** @type {any} */ _one, /** @type {number} */ index) => index !== action.index)),
    move: (state, action) => withList(state, action.list, moved(state.file[action.list], action.index, action.by)),
    toggle: (state, action) => {
      const limits = state.file.limits || {};
      const chosen = limits.methods || [];
      const methods = chosen.includes(action.value) ? chosen.filter((/** @type {string} */ one) => one !== action.value) : [...chosen, action.value];
      return Object.assign({}, state, { file: withField(state.file, ["limits", "methods"], methods.length ? methods : ""), card: null });
    },
    load: (state, action) =>
      Object.assign({}, state, {
        file: action.value, confidence: action.confidence || state.confidence, etchant: action.etchant || null,
        open: [], drawn: DRAWN, card: null, notices: action.notices || [], revision: state.revision + 1,
      }),
    notice: (state, action) => Object.assign({}, state, { notices: action.notices }),
    confidence: (state, action) => Object.assign({}, state, { confidence: action.value, card: null }),
    etchant: (state, action) => Object.assign({}, state, { etchant: action.value || null, card: null }),
    open: (state, action) =>
      Object.assign({}, state, { open: state.open.includes(action.key) ? state.open.filter((key) => key !== action.key) : [...state.open, action.key] }),
    more: (state) => Object.assign({}, state, { drawn: state.drawn + DRAWN }),
    card: (state, action) => Object.assign({}, state, { card: action.key }),
  };

  /** The state after an action. @param {State} state @param {Action} action @returns {State} */
  function after(state, action) {
    const change = ew.evidence.at(CHANGES, action.type);
    if (!change) throw new Error("no such action: " + action.type);
    return change(state, action);
  }

  ew.state = Object.freeze({ initial, after, DRAWN });
})((globalThis.etchwright = globalThis.etchwright || {}));
