// @ts-check
/*
 * Filters of a list: hides the rows that do not fit, keeps the choice in the address so that it can
 * be shared. Without JavaScript the filters stay hidden and the whole list shows.
 */
(function () {
  "use strict";

  function plain(text) {
    return text.normalize("NFKD").toLowerCase().replace(/°/g, "deg");
  }

  function fits(row, chosen) {
    return Object.entries(chosen).every(function ([name, value]) {
      if (!value) return true;
      if (name === "words") {
        const text = plain(row.textContent + " " + row.getAttribute("data-words"));
        return plain(value).split(/\s+/).every((word) => text.includes(word));
      }
      return (row.getAttribute("data-" + name) || "").split(/\s+/).includes(value);
    });
  }

  function start(form) {
    const rows = Array.from(
      document.querySelectorAll('[data-ew-rows="' + form.getAttribute("data-ew-filters") + '"] > tr'),
    );
    const fields = Array.from(form.querySelectorAll("[data-ew-filter]"));
    const count = form.querySelector("[data-ew-count]");

    function apply() {
      const chosen = {};
      for (const field of fields) chosen[field.getAttribute("data-ew-filter")] = field.value.trim();
      let left = 0;
      for (const row of rows) {
        row.hidden = !fits(row, chosen);
        if (!row.hidden) left += 1;
      }
      count.textContent = left === rows.length ? rows.length + " in all" : left + " of " + rows.length;
      const query = new URLSearchParams(Object.entries(chosen).filter((pair) => pair[1])).toString();
      history.replaceState(null, "", query ? "#" + query : location.pathname + location.search);
    }

    const given = new URLSearchParams(location.hash.slice(1));
    for (const field of fields) {
      const value = given.get(field.getAttribute("data-ew-filter"));
      if (value !== null) field.value = value;
      field.addEventListener("input", apply);
    }
    form.addEventListener("reset", () => setTimeout(apply, 0));
    form.addEventListener("submit", (event) => event.preventDefault());
    form.hidden = false;
    apply();
  }

  document.querySelectorAll("[data-ew-filters]").forEach(start);
})();
