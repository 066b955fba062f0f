// @ts-check
/*
 * Finds films and etchants by name or any other name while one types. Works from the list that the
 * page carries (script element "ew-names"); asks no server. Without JavaScript the lists on the page
 * serve instead.
 */
(function () {
  "use strict";
  const MOST = 8;
  const FEW = 2;
  // Half of the letter pairs in common: two slips in a name of ten letters pass, other names do not.
  const ALIKE = 0.5;

  /** Lower case, no marks, digits at one height, letters and digits only: "SiO₂" finds "sio2". */
  function plain(text) {
    return text.normalize("NFKD").toLowerCase().replace(/[^\p{L}\p{N}]+/gu, "");
  }

  /** How an entry holds the typed text as one phrase, or null. */
  function phraseIn(entry, sought) {
    let best = -1;
    let by = "";
    let exact = false;
    for (const name of [entry.name, entry.id].concat(entry.also)) {
      const at = plain(name).indexOf(sought);
      exact = exact || plain(name) === sought;
      if (at >= 0 && (best < 0 || at < best)) {
        best = at;
        by = name === entry.name || name === entry.id ? "" : name;
      }
    }
    return best < 0 ? null : { entry: entry, scattered: 0, at: best, by: by, exact: exact };
  }

  /** How an entry holds every typed word somewhere in its names, in any order, or null. */
  function wordsIn(entry, words) {
    const names = [entry.name, entry.id].concat(entry.also);
    const holding = words.map((word) => names.filter((name) => plain(name).includes(word)));
    if (!words.length || !holding.every((some) => some.length)) return null;
    const whole = names.find((name) => holding.every((some) => some.includes(name)));
    const other = holding.find((some) => !some.includes(entry.name));
    const by = whole || (other ? other[0] : entry.name);
    const at = plain(whole || entry.name).indexOf(words[0]);
    return { entry: entry, scattered: whole ? 1 : 2, at: Math.max(at, 0), by: by === entry.name || by === entry.id ? "" : by, exact: false };
  }

  /** Entries that have the typed text in a name, or failing that each of its words in some name. What
   * is called so comes first, then the whole text before scattered words, then what a recipe removes,
   * then names that start with it, then what most recipes remove. */
  function matches(entries, kind, typed) {
    const sought = plain(typed);
    if (!sought) return [];
    const words = typed.split(/\s+/).map(plain).filter(Boolean);
    const found = entries
      .filter((entry) => !kind || entry.kind === kind)
      .map((entry) => phraseIn(entry, sought) || wordsIn(entry, words))
      .filter(Boolean);
    found.sort(
      (a, b) =>
        Number(b.exact) - Number(a.exact) ||
        a.scattered - b.scattered ||
        Number(!a.entry.recipes) - Number(!b.entry.recipes) ||
        a.at - b.at ||
        b.entry.recipes - a.entry.recipes ||
        a.entry.name.localeCompare(b.entry.name),
    );
    return found;
  }

  /** Pairs of letters that follow each other, with how often. */
  function pairsOf(text) {
    const pairs = new Map();
    for (let at = 0; at + 1 < text.length; at += 1) {
      const pair = text.slice(at, at + 2);
      pairs.set(pair, (pairs.get(pair) || 0) + 1);
    }
    return pairs;
  }

  /** Share of letter pairs that two texts have in common, 0 to 1 (Dice 1945). */
  function likeness(one, other) {
    const [first, second] = [pairsOf(one), pairsOf(other)];
    let common = 0;
    first.forEach((count, pair) => (common += Math.min(count, second.get(pair) || 0)));
    const all = Math.max(one.length - 1, 0) + Math.max(other.length - 1, 0);
    return all ? (2 * common) / all : 0;
  }

  /** Names of up to two entries that may be meant by a text that names none; none for nonsense. */
  function nearest(entries, typed) {
    const byWords = matches(entries, null, typed);
    if (byWords.length) return byWords.slice(0, FEW).map((match) => match.entry.name);
    const sought = plain(typed);
    return entries
      .map((entry) => ({
        entry: entry,
        like: Math.max(...[entry.name, entry.id].concat(entry.also).map((name) => likeness(sought, plain(name)))),
      }))
      .filter((one) => one.like >= ALIKE)
      .sort((a, b) => b.like - a.like || b.entry.recipes - a.entry.recipes || a.entry.name.localeCompare(b.entry.name))
      .slice(0, FEW)
      .map((one) => one.entry.name);
  }

  /** Makes an input a combobox over the entries; `choose` gets the chosen entry. */
  function combobox(input, entries, choose) {
    const kind = input.getAttribute("data-ew-typeahead");
    const list = document.createElement("ul");
    list.className = "ew-suggestions";
    list.id = input.id + "-suggestions";
    list.setAttribute("role", "listbox");
    list.setAttribute("aria-label", "Suggestions");
    list.hidden = true;
    input.parentNode.appendChild(list);
    input.setAttribute("role", "combobox");
    input.setAttribute("aria-autocomplete", "list");
    input.setAttribute("aria-controls", list.id);
    input.setAttribute("aria-expanded", "false");
    let shown = [];
    let active = -1;

    function close() {
      list.hidden = true;
      active = -1;
      input.setAttribute("aria-expanded", "false");
      input.removeAttribute("aria-activedescendant");
    }

    function mark(index) {
      active = index;
      Array.from(list.children).forEach(function (item, at) {
        item.setAttribute("aria-selected", String(at === index));
        if (at === index) {
          input.setAttribute("aria-activedescendant", item.id);
          item.scrollIntoView({ block: "nearest" });
        }
      });
    }

    function take(index) {
      const entry = shown[index].entry;
      close();
      choose(entry);
    }

    function open() {
      shown = matches(entries, kind, input.value).slice(0, MOST);
      list.replaceChildren(
        ...shown.map(function (match, index) {
          const item = document.createElement("li");
          item.className = "ew-suggestion";
          item.id = list.id + "-" + index;
          item.setAttribute("role", "option");
          item.setAttribute("aria-selected", "false");
          item.textContent = match.entry.name;
          if (match.by) {
            const also = document.createElement("span");
            also.className = "ew-suggestion-also";
            also.textContent = "(" + match.by + ")";
            item.appendChild(also);
          }
          item.addEventListener("mousedown", function (event) {
            event.preventDefault();
            take(index);
          });
          return item;
        }),
      );
      if (!shown.length) return close();
      list.hidden = false;
      input.setAttribute("aria-expanded", "true");
      mark(0);
    }

    input.addEventListener("input", open);
    input.addEventListener("blur", close);
    input.addEventListener("keydown", function (event) {
      if (event.key === "Escape") return close();
      if (list.hidden) return;
      if (event.key === "ArrowDown") mark((active + 1) % shown.length);
      else if (event.key === "ArrowUp") mark((active + shown.length - 1) % shown.length);
      else if (event.key === "Enter") take(active);
      else return;
      event.preventDefault();
    });
  }

  /** The home page: what to remove, what must stay, and where that leads. */
  function ask(entries) {
    const box = document.querySelector("[data-ew-ask]");
    const answer = document.querySelector("[data-ew-answer]");
    if (!box || !answer) return;
    box.hidden = false;
    const remove = box.querySelector("#ask-remove");
    const keep = box.querySelector("#ask-keep");
    let target = null;
    const kept = [];

    function link(text, address) {
      const a = document.createElement("a");
      a.href = address;
      a.textContent = text;
      return a;
    }

    /** What removes the target, with first look and latest stop. */
    function recipes(entry) {
      const list = document.createElement("ul");
      list.append(...entry.removed_by.map(function (one) {
        const item = document.createElement("li");
        item.append(link(one.name, one.target), " ", Object.assign(document.createElement("span"),
          { className: "ew-quiet", textContent: one.words }));
        return item;
      }));
      return list;
    }

    function show() {
      answer.replaceChildren();
      answer.hidden = !target && !kept.length;
      if (answer.hidden) return;
      if (target) {
        const count = target.recipes === 1 ? "One recipe removes " : (target.recipes || "No") + " recipes remove ";
        answer.append((target.recipes ? count : "No recipe of this lab removes "),
          target.is_family ? "a film that goes by the name " : "", link(target.name, target.target), ". ");
        if (target.removed_by.length) answer.append("First look – latest stop:", recipes(target));
      }
      if (kept.length) {
        answer.append("To stay: ");
        kept.forEach(function (entry, index) {
          const button = document.createElement("button");
          button.type = "button";
          button.className = "ew-button";
          button.textContent = entry.name + " ×";
          button.setAttribute("aria-label", "Leave out " + entry.name);
          button.addEventListener("click", function () {
            kept.splice(index, 1);
            show();
          });
          answer.append(button, " ");
        });
      }
      const planner = box.getAttribute("data-ew-planner");
      if (target && planner) {
        const query = new URLSearchParams({ remove: target.id, keep: kept.map((entry) => entry.id).join(",") });
        answer.append(link("Plan it on your sample", planner + "#" + query.toString()));
      }
    }

    combobox(remove, entries, function (entry) {
      target = entry;
      remove.value = entry.name;
      show();
    });
    combobox(keep, entries, function (entry) {
      if (!kept.includes(entry)) kept.push(entry);
      keep.value = "";
      show();
    });
  }

  // The planner's form has fields of the same kind.
  (globalThis.etchwright = globalThis.etchwright || {}).find = Object.freeze({ combobox: combobox, matches: matches, nearest: nearest });

  const data = document.getElementById("ew-names");
  if (data) ask(JSON.parse(data.textContent || "[]"));
})();
