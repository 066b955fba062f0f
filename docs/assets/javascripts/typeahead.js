// @ts-check
/*
 * Finds films and etchants by name or any other name while one types. Works from the list that the
 * page carries (script element "ew-names"); asks no server. Without JavaScript the lists on the page
 * serve instead.
 */
(function () {
  "use strict";
  const MOST = 8;

  /** Lower case, no marks, digits at one height, letters and digits only: "SiO₂" finds "sio2". */
  function plain(text) {
    return text.normalize("NFKD").toLowerCase().replace(/[^\p{L}\p{N}]+/gu, "");
  }

  /** Entries whose name or other name holds the word; what a recipe removes comes first, then the
   * very name, then names that start with it, then what most recipes remove. */
  function matches(entries, kind, word) {
    const sought = plain(word);
    if (!sought) return [];
    const found = [];
    for (const entry of entries) {
      if (kind && entry.kind !== kind) continue;
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
      if (best >= 0) found.push({ entry: entry, at: best, by: by, exact: exact });
    }
    found.sort(
      (a, b) =>
        Number(!a.entry.recipes) - Number(!b.entry.recipes) ||
        Number(b.exact) - Number(a.exact) ||
        a.at - b.at ||
        b.entry.recipes - a.entry.recipes ||
        a.entry.name.localeCompare(b.entry.name),
    );
    return found.slice(0, MOST);
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
      shown = matches(entries, kind, input.value);
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

    function show() {
      answer.replaceChildren();
      answer.hidden = !target && !kept.length;
      if (answer.hidden) return;
      if (target) {
        const count = target.recipes === 1 ? "One recipe removes " : (target.recipes || "No") + " recipes remove ";
        answer.append((target.recipes ? count : "No recipe of this lab removes "), link(target.name, target.target), ". ");
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
        answer.append(link("Plan it on this sample", planner + "#" + query.toString()));
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
  (globalThis.etchwright = globalThis.etchwright || {}).find = Object.freeze({ combobox: combobox });

  const data = document.getElementById("ew-names");
  if (data) ask(JSON.parse(data.textContent || "[]"));
})();
