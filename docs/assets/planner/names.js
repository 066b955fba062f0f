// @ts-check
/* Films and etchants by the names that people type. */
(function (ew) {
  "use strict";

  /** @typedef {{id: string, name: string, also: string[], kind: string, recipes: number, names?: string[]}} Entry `also` holds the formula beside the names */

  /** What the typeahead searches: every film and etchant with its other names. @param {Facts} facts */
  function entriesOf(facts) {
    const removes = new Map();
    for (const etch of Object.values(facts.etches)) for (const film of etch.targets) removes.set(film, (removes.get(film) || 0) + 1);
    const films = Object.values(facts.films)
      .map((film) => ({ id: film.id, name: film.name, also: [...film.names, film.formula].filter((name) => name && name !== film.name), kind: "film", recipes: removes.get(film.id) || 0, names: film.names }));
    const etchants = Object.values(facts.etchants).map((one) => ({ id: one.id, name: one.name, also: /** @type {string[]} */ ([]), kind: "etchant", recipes: 1 }));
    return { films: films, etchants: etchants };
  }

  /** The id of the only one that is called exactly so, else the text as typed: a part of a name may be of a film that nobody means. @param {Entry[]} entries @param {string} typed */
  function idOf(entries, typed) {
    const sought = typed.trim().toLowerCase();
    const entry = entries.find((one) => one.id === sought || one.name.toLowerCase() === sought);
    if (entry) return entry.id;
    // A formula is no name: many films are SiO2, and the first of them is not the one that is meant.
    const called = entries.filter((one) => (one.names || one.also).some((name) => name.toLowerCase() === sought));
    return called.length === 1 ? called[0].id : typed.trim();
  }

  /** @param {Entry[]} entries @param {string} id */
  function nameOf(entries, id) {
    const entry = entries.find((one) => one.id === id);
    return entry ? entry.name : id;
  }

  /** What is wrong with a name that names nothing. @param {Entry[]} entries @param {string} kind @param {string} typed */
  function unknownWords(entries, kind, typed) {
    const near = ew.find.nearest(entries, typed);
    return "there is no " + kind + ' "' + typed + '"' + (near.length ? "; did you mean " + near.join(", or ") + "?" : "");
  }

  ew.names = Object.freeze({ entriesOf, idOf, nameOf, unknownWords });
})((globalThis.etchwright = globalThis.etchwright || {}));
