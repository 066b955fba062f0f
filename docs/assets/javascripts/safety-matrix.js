// The safety matrices: arrow keys walk the cells, row and column of the cell in focus are lit, and its evidence
// comes into view beside the table. Without this script every cell is a plain link to its evidence.
(function () {
  "use strict";
  var LIT = "ew-pairs-lit";
  var OPEN = "ew-pairs-open";
  var STEPS = { ArrowLeft: [0, -1], ArrowRight: [0, 1], ArrowUp: [-1, 0], ArrowDown: [1, 0] };

  function cellsOf(table) {
    return Array.from(table.tBodies[0].rows).map(function (row) { return Array.from(row.cells); });
  }

  function placeOf(cell) {
    return [cell.parentElement.sectionRowIndex, cell.cellIndex];
  }

  function light(table, cell) {
    table.querySelectorAll("." + LIT).forEach(function (one) { one.classList.remove(LIT); });
    var place = placeOf(cell);
    Array.from(table.rows).forEach(function (row) {
      if (row.parentElement === cell.parentElement.parentElement && row.sectionRowIndex === place[0]) {
        Array.from(row.cells).forEach(function (one) { one.classList.add(LIT); });
      } else if (row.cells[place[1]]) {
        row.cells[place[1]].classList.add(LIT);
      }
    });
  }

  function show(cell) {
    document.querySelectorAll("." + OPEN).forEach(function (one) { one.classList.remove(OPEN); });
    var link = cell.querySelector("a[href^='#']");
    if (!link) { return; }
    var anchors = [link.hash.slice(1)].concat((link.dataset.also || "").split(" ").filter(Boolean));
    var entries = anchors.map(function (anchor) { return document.getElementById(anchor); }).filter(Boolean);
    entries.forEach(function (entry) { entry.classList.add(OPEN); });
    if (entries.length) {
      var box = entries[0].parentElement;
      if (box.scrollHeight > box.clientHeight) { box.scrollTop = entries[0].offsetTop - box.offsetTop; }
    }
  }

  function focus(table, cell) {
    table.querySelectorAll("td[tabindex='0']").forEach(function (one) { one.tabIndex = -1; });
    cell.tabIndex = 0;
    cell.focus();
  }

  function walk(table, event) {
    var step = STEPS[event.key];
    var cell = event.target.closest("td");
    if (!step || !cell) { return; }
    var rows = cellsOf(table);
    var place = placeOf(cell);
    var row = rows[place[0] + step[0]];
    var next = row && row[place[1] + step[1]];
    if (next && next.tagName === "TD") {
      event.preventDefault();
      focus(table, next);
    }
  }

  function start(table) {
    var first = table.querySelector("tbody td");
    if (!first) { return; }
    table.querySelectorAll("tbody td").forEach(function (cell) {
      cell.tabIndex = -1;
      var link = cell.querySelector("a");
      if (link) { link.tabIndex = -1; }
    });
    first.tabIndex = 0;
    table.addEventListener("keydown", function (event) {
      walk(table, event);
      var cell = event.target.closest("td");
      var link = cell && cell.querySelector("a");
      if (event.key === "Enter" && link && event.target === cell) { link.click(); }
    });
    table.addEventListener("focusin", function (event) {
      var cell = event.target.closest("tbody td");
      if (cell) {
        light(table, cell);
        show(cell);
      }
    });
    table.addEventListener("click", function (event) {
      var cell = event.target.closest("tbody td");
      if (!cell) { return; }
      // Beside the table the evidence scrolls in its own box; below it the link itself leads there.
      if (window.matchMedia("(min-width: 60.01rem)").matches && event.target.closest("a[href^='#']")) {
        event.preventDefault();
      }
      focus(table, cell);
    });
  }

  document.querySelectorAll("table[data-safety-matrix]").forEach(start);
})();
