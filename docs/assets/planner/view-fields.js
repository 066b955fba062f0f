// @ts-check
/* Labelled fields of the form. Each has the id of its place in the sample file, and room for what is wrong. */
(function (ew) {
  "use strict";

  /** @typedef {{state: any, data: PlannerData, problems: {field: string, words: string}[], send: (action: any) => void, entries: any[], etchants: any[]}} Shown */

  /** @param {string} field */
  function idOf(field) {
    return "plan-" + field.replace(/\//g, "-");
  }

  /** The value at a place of the sample file, or blank. @param {any} file @param {string} field */
  function valueAt(file, field) {
    const found = field.split("/").reduce((whole, name) => (whole === undefined || whole === null ? undefined : whole[name]), file);
    return found === undefined || found === null ? "" : found;
  }

  /** @param {string} label @param {string} field @param {any} control @param {string} [kind] */
  function labelled(label, field, control, kind) {
    const { el } = ew.dom;
    const hooks = ew.hooks;
    const id = idOf(field);
    control.id = id;
    control.setAttribute("aria-describedby", id + "-fault");
    return el("div", { class: hooks.field + (kind ? " " + kind : "") },
      el("label", { for: id }, label), control, el("p", { class: hooks.fault, id: id + "-fault" }));
  }

  /** A text field. @param {Shown} shown @param {string} label @param {string} field @param {{kind?: string, placeholder?: string}} [more] */
  function text(shown, label, field, more) {
    const input = ew.dom.el("input", {
      type: "text", autocomplete: "off", spellcheck: "false", placeholder: more && more.placeholder,
      value: String(valueAt(shown.state.file, field)),
      oninput: () => shown.send({ type: "set", field: field, value: input.value.trim() }),
    });
    return labelled(label, field, input, more && more.kind);
  }

  /** A field that takes a bare number. @param {Shown} shown @param {string} label @param {string} field @param {string} placeholder */
  function number(shown, label, field, placeholder) {
    const input = ew.dom.el("input", {
      type: "text", inputmode: "decimal", autocomplete: "off", placeholder: placeholder, value: String(valueAt(shown.state.file, field)),
      oninput: function () {
        const typed = input.value.trim();
        const value = Number(typed);
        shown.send({ type: "set", field: field, value: typed !== "" && Number.isFinite(value) ? value : typed });
      },
    });
    return labelled(label, field, input, ew.hooks.narrow);
  }

  /** A choice; `options` are pairs of value and words. @param {Shown} shown @param {string} label @param {string} field @param {string[][]} options @param {string} [kind] */
  function choice(shown, label, field, options, kind) {
    return labelled(label, field, select(String(valueAt(shown.state.file, field)), options, (value) => shown.send({ type: "set", field: field, value: value, rebuild: false })), kind);
  }

  /** @param {string} value @param {string[][]} options @param {(value: string) => void} send */
  function select(value, options, send) {
    const { el } = ew.dom;
    const control = el("select", { onchange: () => send(control.value) },
      options.map(([one, words]) => el("option", { value: one, selected: one === value }, words)));
    return control;
  }

  /** A film or an etchant by any of its names. @param {Shown} shown @param {string} label @param {string} field @param {any[]} entries @param {{kind?: string, placeholder?: string, freeWords?: boolean}} [more] `freeWords`: a text that names nothing may stand too */
  function named(shown, label, field, entries, more) {
    const id = String(valueAt(shown.state.file, field));
    const input = ew.dom.el("input", {
      type: "text", autocomplete: "off", spellcheck: "false", placeholder: more && more.placeholder, value: ew.names.nameOf(entries, id),
      oninput: () => shown.send({ type: "set", field: field, value: idTyped() }),
      // Once typing is over, the field shows which film was understood.
      onchange: () => (input.value = ew.names.nameOf(entries, idTyped())),
    });
    const idTyped = () => ew.names.idOf(entries, input.value);
    const whole = labelled(label, field, input, more && more.kind);
    ew.find.combobox(input, entries, function (/** @type {any} */ entry) {
      input.value = entry.name;
      shown.send({ type: "set", field: field, value: entry.id, rebuild: true });
    });
    return whole;
  }

  /** Shows at each field what is wrong with it. @param {Element} form @param {{field: string, words: string}[]} problems */
  function showProblems(form, problems) {
    const hooks = ew.hooks;
    const byId = new Map(problems.map((one) => [idOf(one.field), one.words]));
    for (const place of form.querySelectorAll("." + hooks.fault)) {
      const id = place.id.replace(/-fault$/, "");
      const control = document.getElementById(id);
      const isBlank = control instanceof HTMLInputElement && control.value === "";
      const words = byId.get(id);
      // A blank field is no mistake yet; what is still missing is listed with the answers.
      place.textContent = words && !isBlank ? words : "";
      if (!control) continue;
      if (words && !isBlank) control.setAttribute("aria-invalid", "true");
      else control.removeAttribute("aria-invalid");
    }
  }

  ew.viewFields = Object.freeze({ idOf, valueAt, labelled, text, number, choice, select, named, showProblems });
})((globalThis.etchwright = globalThis.etchwright || {}));
