// @ts-check
/*
 * The matrices of films by etches: arrow keys walk the cells, row and column of the cell in focus are lit, its
 * evidence opens beside the table, filters narrow rows and columns, and the time can be chosen. What a cell
 * opens comes from the script element "ew-matrix-data". Columns that are left out are taken from the document,
 * because a browser spends seconds on the styles of tens of thousands of hidden cells; a line says how many.
 * Without JavaScript the table reads as it stands, with all its columns.
 */
(function () {
  "use strict";
  const LIT = "ew-grid-lit";
  /** Columns of numbers that an upright sheet of A4 holds. */
  const MOST_WITH_NUMBERS = 12;
  const VERDICTS = { h: "holds", b: "borderline", l: "lost", u: "unmeasured" };
  const STEPS = { ArrowLeft: [0, -1], ArrowRight: [0, 1], ArrowUp: [-1, 0], ArrowDown: [1, 0] };
  const SVG = "http://www.w3.org/2000/svg";

  function plain(text) {
    return text.normalize("NFKD").toLowerCase();
  }

  function element(name, text, css) {
    const made = document.createElement(name);
    if (text) made.textContent = text;
    if (css) made.className = css;
    return made;
  }

  function mark(verdict) {
    const svg = document.createElementNS(SVG, "svg");
    svg.setAttribute("class", "ew-mark");
    svg.setAttribute("width", "18");
    svg.setAttribute("height", "12");
    svg.setAttribute("aria-hidden", "true");
    const use = document.createElementNS(SVG, "use");
    use.setAttribute("href", "#mark-" + verdict);
    svg.append(use);
    return svg;
  }

  /** What a cell says at a time: word, short text, and the lines of its evidence. */
  function told(data, cell, time) {
    const text = (place) => data.texts[place];
    if (data.kind === "selectivity") {
      return {
        verdict: "", short: text(cell[0]), said: text(cell[1]),
        lines: [["Selectivity", text(cell[1])], ["How", text(cell[2])], ["Rank", text(cell[3])],
          ["Rate of the target", text(cell[4][0])], ["Rate of this film", text(cell[4][1])]],
        sources: cell[5],
      };
    }
    const verdict = VERDICTS[cell[0][time]];
    return {
      verdict: verdict, short: text(cell[1][time]), said: verdict + ", " + text(cell[1][time]),
      lines: [["Loss", text(cell[2][time])], ["Why", text(cell[3][time])], ["Rate", text(cell[4])],
        ["Rank", text(cell[5])], ["Said of it", text(cell[6])]],
      sources: cell[7],
    };
  }

  function start(table, data, panel, form) {
    const body = table.tBodies[0];
    const rows = Array.from(body.rows);
    const heads = Array.from(table.tHead.rows[1].cells).slice(1);
    const methods = Array.from(table.tHead.rows[0].cells).slice(1);
    const cells = rows.map((row) => Array.from(row.cells).slice(1));
    const width = table.querySelector("col[span]");
    const leftOut = document.querySelector("[data-ew-left-out]");
    let places = heads.map((head, place) => place);
    const timeChoice = form.querySelector("[data-ew-time]");
    const still = document.querySelector("[data-ew-still]");
    let current = null;
    let lit = [];

    const time = () => (timeChoice ? Number(timeChoice.value) : 0);
    const headOf = (cell) => heads[places[cell.cellIndex - 1]];
    const dataOf = (cell) => data.rows[cell.parentElement.sectionRowIndex][places[cell.cellIndex - 1]];

    function unlight() {
      lit.forEach((one) => one.classList.remove(LIT));
      lit = [];
    }

    function light(cell) {
      unlight();
      lit = [cell.parentElement, headOf(cell)].concat(rows.map((row) => row.cells[cell.cellIndex]));
      lit.forEach((one) => one.classList.add(LIT));
    }

    function link(source) {
      const made = element("a", source.textContent.trim());
      made.href = source.getAttribute("href");
      return made;
    }

    function evidence(cell, found) {
      const title = element("p", "", "ew-matrix-title");
      title.append(link(cell.parentElement.cells[0].querySelector("a")), " in ",
        link(headOf(cell).querySelector("a")));
      panel.replaceChildren(title);
      if (!found) {
        const word = element("p", "", "ew-verdict ew-verdict-unmeasured");
        word.append(mark("unmeasured"), "unmeasured");
        panel.append(word, element("p", "Nothing is on record for this pair. That is no sign that it holds."));
        return;
      }
      if (found.verdict) {
        const word = element("p", "", "ew-verdict ew-verdict-" + found.verdict);
        word.append(mark(found.verdict), found.verdict);
        if (timeChoice) word.append(element("span", " " + timeChoice.selectedOptions[0].text, "ew-quiet"));
        panel.append(word);
      }
      const list = element("dl", "", "ew-fact-list");
      found.lines.filter((line) => line[1]).forEach(function (line) {
        list.append(element("dt", line[0]), element("dd", line[1]));
      });
      panel.append(list);
      if (found.sources.length) {
        const line = element("p", "Sources: ", "ew-quiet");
        found.sources.forEach(function (source, index) {
          const made = element("a", data.texts[source[1]]);
          made.href = table.getAttribute("data-ew-sources") + "#" + data.texts[source[0]];
          line.append(index ? "; " : "", made);
        });
        panel.append(line);
      }
    }

    function open(cell) {
      const raw = dataOf(cell);
      const found = raw ? told(data, raw, time()) : null;
      cell.setAttribute("aria-label", cell.parentElement.cells[0].textContent.trim() + " in "
        + headOf(cell).textContent.trim() + ": " + (found ? found.said : "unmeasured"));
      light(cell);
      evidence(cell, found);
    }

    function focus(cell) {
      if (current) current.tabIndex = -1;
      current = cell;
      cell.tabIndex = 0;
      cell.focus();
    }

    const isShown = (cell) => cell && cell.tagName === "TD" && cell.isConnected && !cell.parentElement.hidden;

    function next(cell, step) {
      let row = cell.parentElement.sectionRowIndex;
      let place = cell.cellIndex;
      for (;;) {
        row += step[0];
        place += step[1];
        const found = rows[row] && place > 0 ? rows[row].cells[place] : undefined;
        if (!found || isShown(found)) return found;
      }
    }

    function edge(cell, atStart) {
      const shown = Array.from(cell.parentElement.cells).filter(isShown);
      return atStart ? shown[0] : shown[shown.length - 1];
    }

    function walk(event) {
      const cell = event.target.closest("td");
      if (!cell || event.ctrlKey || event.altKey || event.metaKey) return;
      const step = STEPS[event.key];
      const found = step ? next(cell, step)
        : event.key === "Home" ? edge(cell, true) : event.key === "End" ? edge(cell, false) : null;
      if (step || event.key === "Home" || event.key === "End") event.preventDefault();
      if (found) focus(found);
    }

    function retime() {
      data.rows.forEach(function (line, index) {
        Object.keys(line).forEach(function (place) {
          const cell = cells[index][Number(place)];
          const found = told(data, line[place], time());
          cell.classList.remove("ew-verdict-holds", "ew-verdict-borderline", "ew-verdict-lost", "ew-verdict-unmeasured");
          cell.classList.add("ew-verdict-" + found.verdict);
          cell.textContent = found.short;
        });
      });
      still.textContent = "Shown for " + timeChoice.selectedOptions[0].text + ".";
      if (current) open(current);
    }

    function narrow() {
      const asked = {};
      form.querySelectorAll("[data-ew-narrow]").forEach(function (field) {
        asked[field.getAttribute("data-ew-narrow")] = field.value.trim();
      });
      const words = plain(asked.film).split(/\s+/).filter(Boolean);
      const isIn = heads.map((head) => ["kind", "method", "etchant"].every(
        (name) => !asked[name] || head.getAttribute("data-" + name) === asked[name]));
      let shown = 0;
      rows.forEach(function (row) {
        const text = plain(row.cells[0].textContent + " " + row.getAttribute("data-words"));
        row.hidden = Boolean(asked.family && row.getAttribute("data-family") !== asked.family)
          || !words.every((word) => text.includes(word));
        if (!row.hidden) shown += 1;
      });
      place(heads.map((head, index) => index).filter((index) => isIn[index]));
      form.querySelector("[data-ew-matrix-count]").textContent = shown + " of " + rows.length + " films, "
        + places.length + " of " + heads.length + " etches";
      tellLeftOut(isIn, rows.length - shown);
      if (!isShown(current)) enter();
    }

    /** Only these columns stand in the table. */
    function place(wanted) {
      table.toggleAttribute("data-ew-wide", Boolean(timeChoice) && wanted.length > MOST_WITH_NUMBERS);
      if (wanted.join() === places.join()) return;
      places = wanted;
      const pick = (row, all) => row.replaceChildren(row.cells[0], ...wanted.map((index) => all[index]));
      body.remove();
      pick(table.tHead.rows[1], heads);
      rows.forEach((row, index) => pick(row, cells[index]));
      width.span = Math.max(wanted.length, 1);
      span();
      table.append(body);
    }

    /** What is left out is said, on paper too, so that nothing reads as if it were not there. */
    function tellLeftOut(isIn, films) {
      const count = (kind) => heads.filter(
        (head, index) => !isIn[index] && head.getAttribute("data-kind") === kind).length;
      const counted = [
        [count("published"), "etch known", "etches known", " from published facts alone"],
        [count("recipe"), "recipe", "recipes", " of this lab"], [films, "film", "films", ""],
      ];
      const words = counted.filter((one) => one[0]).map((one) => one[0] + " " + one[one[0] === 1 ? 1 : 2] + one[3]);
      leftOut.textContent = "Left out of this view: " + words.join(", ") + ".";
      leftOut.hidden = !words.length;
    }

    /** The names of methods reach over the columns that are left. */
    function span() {
      let from = 0;
      methods.forEach(function (method) {
        const end = from + Number(method.dataset.size);
        const left = places.filter((index) => from <= index && index < end).length;
        method.hidden = !left;
        method.colSpan = Math.max(left, 1);
        from = end;
      });
    }

    /** The one cell that the Tab key reaches; the arrows lead on from there. */
    function enter() {
      if (current) current.removeAttribute("tabindex");
      unlight();
      const row = rows.find((one) => !one.hidden);
      current = (row && Array.from(row.cells).find(isShown)) || null;
      if (current) current.tabIndex = 0;
    }

    methods.forEach((method) => { method.dataset.size = String(method.colSpan); });
    table.setAttribute("role", "grid");
    table.addEventListener("keydown", walk);
    table.addEventListener("focusin", function (event) {
      const cell = event.target.closest("tbody td");
      if (cell) open(cell);
    });
    table.addEventListener("click", function (event) {
      const cell = event.target.closest("tbody td");
      if (cell) focus(cell);
    });
    form.addEventListener("submit", (event) => event.preventDefault());
    form.addEventListener("input", narrow);
    form.addEventListener("reset", () => setTimeout(function () { narrow(); if (timeChoice) retime(); }, 0));
    if (timeChoice) timeChoice.addEventListener("change", retime);
    // On the screen the choice itself says for which time the cells are; on paper this line does.
    if (still) still.classList.add("ew-paper-only");
    form.hidden = false;
    panel.hidden = false;
    narrow();
    table.setAttribute("data-ew-ready", "");
  }

  const table = document.querySelector("table[data-ew-matrix]");
  const source = document.getElementById("ew-matrix-data");
  const panel = document.querySelector("[data-ew-evidence]");
  const form = document.querySelector("[data-ew-matrix-filters]");
  if (table && source && panel && form) {
    const data = JSON.parse(source.textContent || "{}");
    if (data.format === 1) start(table, data, panel, form);
  }
})();
