// @ts-check
/* The form in which a sample is built: layers from the top, what else is in reach, back, edge, goal, limits, steps. */
(function (ew) {
  "use strict";

  const ROLES = [["mask", "mask"], ["target", "to remove"], ["under", "stays"]];
  const EXPOSED = [["face", "its face"], ["sidewall", "its sidewall"], ["both-faces", "both faces"]];
  const EDGES = [["", "not stated"], ["open", "open to the etch"], ["protected", "protected"], ["unused", "not used"]];
  const BACKS = [["", "not stated"], ["protected", "protected"], ["film", "a film"]];
  const DEPTHS = [["through", "right through"], ["through-wafer", "through wafer"], ["depth", "to a depth"]];
  const METHODS = ["wet", "vapour", "plasma", "cyclic", "lift-off"];
  const TREATS = [["develop", "develop"], ["strip", "strip"], ["clean", "clean"], ["rework", "rework"], ["rinse", "rinse"]];

  /** @param {string} title @param {...any} children */
  function group(title, ...children) {
    const { el } = ew.dom;
    return el("fieldset", { class: ew.hooks.group }, el("legend", {}, title), ...children);
  }

  /** @param {string} words @param {() => void} act @param {{[name: string]: any}} [given] */
  function button(words, act, given) {
    return ew.dom.el("button", Object.assign({ type: "button", class: ew.hooks.button, onclick: act }, given), words);
  }

  /** Up, down, out: the buttons of one item of a list. @param {any} shown @param {string} list @param {number} index @param {number} count @param {string} name @param {boolean} ordered */
  function itemButtons(shown, list, index, count, name, ordered) {
    const hooks = ew.hooks;
    const id = ew.viewFields.idOf(list + "/" + index);
    const small = (/** @type {string} */ sign, /** @type {string} */ label, /** @type {string} */ key, /** @type {any} */ action, /** @type {boolean} */ off) =>
      button(sign, () => shown.send(action), { class: hooks.button + " " + hooks.small, "aria-label": label + " " + name, id: id + "-" + key, disabled: off });
    return ew.dom.el("div", { class: hooks.buttons },
      ordered && small("↑", "Move up", "up", { type: "move", list: list, index: index, by: -1, focus: ew.viewFields.idOf(list + "/" + (index - 1)) + "-up" }, index === 0),
      ordered && small("↓", "Move down", "down", { type: "move", list: list, index: index, by: 1, focus: ew.viewFields.idOf(list + "/" + (index + 1)) + "-down" }, index === count - 1),
      small("×", "Leave out", "out", { type: "remove", list: list, index: index, focus: ew.viewFields.idOf(list) + "-add" }, false));
  }

  /** Fields that few films need; open where one of them is filled or asked for. @param {any} shown @param {string} field @param {any} film @param {boolean} isBack */
  function fewFields(shown, field, film, isBack) {
    const { el } = ew.dom;
    const fields = ew.viewFields;
    const facts = ew.evidence.at(shown.data.facts.films, film.film || "");
    const asksUnder = Boolean(facts && facts.adhesion.length);
    const isFilled = film.allowed_loss !== undefined || film.on !== undefined || film.surface !== undefined;
    const under = [{ id: "none", name: "nothing", also: ["none"] }, ...shown.entries];
    return el("details", { class: ew.hooks.more, open: isFilled || asksUnder, id: fields.idOf(field + "/more") },
      el("summary", {}, asksUnder ? "What lies under it? How much may go?" : "How much may go, what lies under it",
        el("span", { class: ew.hooks.quiet, id: fields.idOf(field + "/default") })),
      el("div", { class: ew.hooks.fields },
        fields.text(shown, "May lose", field + "/allowed_loss", { kind: ew.hooks.wide }),
        !isBack && fields.named(shown, asksUnder ? "Under it (usually " + facts.adhesion.join(", ") + ")" : "Directly under it", field + "/on", under, { placeholder: "film or nothing" }),
        fields.choice(shown, "Surface", field + "/surface", [["", "may roughen"], ["critical", "stays smooth"]], ew.hooks.narrow)));
  }

  /** @param {any} shown @param {any} layer @param {number} index */
  function layerRow(shown, layer, index) {
    const { el } = ew.dom;
    const hooks = ew.hooks;
    const fields = ew.viewFields;
    const field = "layers/" + index;
    const name = layer.film ? ew.names.nameOf(shown.entries, layer.film) : "layer " + (index + 1);
    const isTarget = layer.role === "target";
    return el("li", { class: hooks.row + (isTarget ? " " + hooks.rowTarget : "") },
      el("div", { class: hooks.fields },
        fields.named(shown, "Film", field + "/film", shown.entries, { placeholder: "oxide, Si3N4, Al …", kind: hooks.wide }),
        fields.text(shown, "Thickness", field + "/thickness", { placeholder: "500 nm +/- 10 nm", kind: hooks.narrow }),
        fields.labelled("Role", field + "/role", fields.select(layer.role || "", layer.role ? ROLES : [["", "choose …"], ...ROLES], (/** @type {string} */ value) => shown.send({ type: "set", field: field + "/role", value: value, rebuild: true })), hooks.narrow),
        itemButtons(shown, "layers", index, shown.state.file.layers.length, name, true)),
      !isTarget && fewFields(shown, field, layer, false));
  }

  /** @param {any} shown @param {any} film @param {number} index */
  function exposedRow(shown, film, index) {
    const { el } = ew.dom;
    const hooks = ew.hooks;
    const fields = ew.viewFields;
    const field = "also_exposed/" + index;
    const name = film.film ? ew.names.nameOf(shown.entries, film.film) : "exposed film " + (index + 1);
    return el("li", { class: hooks.row },
      el("div", { class: hooks.fields },
        fields.named(shown, "Film", field + "/film", shown.entries, { placeholder: "gold, aluminium …", kind: hooks.wide }),
        fields.text(shown, "Thickness", field + "/thickness", { placeholder: "300 nm", kind: hooks.narrow }),
        fields.choice(shown, "Open is", field + "/exposed", EXPOSED, hooks.narrow),
        itemButtons(shown, "also_exposed", index, 0, name, false)),
      fewFields(shown, field, film, false));
  }

  /** @param {any} shown @param {string} list @param {string} words @param {any} value @param {string} focus name of the field to go to */
  function addButton(shown, list, words, value, focus) {
    const count = (shown.state.file[list] || []).length;
    const field = ew.viewFields.idOf(list + "/" + count + "/" + focus);
    return button(words, () => shown.send({ type: "add", list: list, value: value, focus: field }), { id: ew.viewFields.idOf(list) + "-add" });
  }

  /** Where a new layer goes by default: a mask on top is rare, so what comes next is what lies below. @param {any[]} layers */
  function nextRole(layers) {
    return layers.some((layer) => layer.role === "target") ? "under" : layers.length ? "target" : "mask";
  }

  /** @param {any} shown */
  function layers(shown) {
    const { el } = ew.dom;
    const { layers, also_exposed: exposed } = shown.state.file;
    return [
      group("Layers, from the top",
        el("ol", { class: ew.hooks.list }, layers.map((/** @type {any} */ layer, /** @type {number} */ index) => layerRow(shown, layer, index))),
        addButton(shown, "layers", layers.length ? "Add a layer below" : "Add the first layer", { film: "", thickness: "", role: nextRole(layers) }, "film")),
      group("Also open to the etch: pads, edges, steps",
        el("ul", { class: ew.hooks.list }, (exposed || []).map((/** @type {any} */ film, /** @type {number} */ index) => exposedRow(shown, film, index))),
        addButton(shown, "also_exposed", "Add a film", { film: "", thickness: "", exposed: "face" }, "film")),
    ];
  }

  /** @param {any} shown */
  function around(shown) {
    const fields = ew.viewFields;
    const back = shown.state.file.back;
    const kind = back === undefined ? "" : back === "protected" ? "protected" : "film";
    const setBack = (/** @type {string} */ value) => shown.send({ type: "set", field: "back", value: value === "film" ? { film: "" } : value, rebuild: true });
    return group("Back and edge",
      ew.dom.el("div", { class: ew.hooks.fields },
        fields.labelled("Back side", "back", fields.select(kind, BACKS, setBack), ew.hooks.narrow),
        kind === "film" && fields.named(shown, "Film on the back", "back/film", shown.entries, { kind: ew.hooks.wide }),
        kind === "film" && fields.text(shown, "Thickness", "back/thickness", { kind: ew.hooks.narrow }),
        kind === "film" && fields.text(shown, "May lose", "back/allowed_loss", { kind: ew.hooks.wide }),
        fields.choice(shown, "Edge of the sample", "edge", EDGES, ew.hooks.narrow)));
  }

  /** @param {any} shown */
  function goal(shown) {
    const fields = ew.viewFields;
    const depth = fields.valueAt(shown.state.file, "goal/depth") || "through";
    const kind = depth === "through" || depth === "through-wafer" ? depth : "depth";
    const setDepth = (/** @type {string} */ value) => shown.send({ type: "set", field: "goal/depth", value: value === "depth" ? "100 nm" : value === "through" ? "" : value, rebuild: true });
    return group("Goal",
      ew.dom.el("div", { class: ew.hooks.fields },
        fields.labelled("How deep", "goal/kind", fields.select(kind, DEPTHS, setDepth), ew.hooks.narrow),
        kind === "depth" && fields.text(shown, "Depth", "goal/depth", { kind: ew.hooks.narrow }),
        fields.text(shown, "Narrowest line that must stay", "goal/line", { placeholder: "10 um", kind: ew.hooks.narrow }),
        fields.text(shown, "Narrowest opening", "goal/window", { placeholder: "5 um", kind: ew.hooks.narrow }),
        fields.number(shown, "Open area, cm²", "goal/load_cm2", "12")));
  }

  /** @param {any} shown */
  function limits(shown) {
    const { el } = ew.dom;
    const fields = ew.viewFields;
    const hooks = ew.hooks;
    const chosen = fields.valueAt(shown.state.file, "limits/methods") || [];
    const methods = METHODS.map((method) =>
      el("label", { class: hooks.choice },
        el("input", { type: "checkbox", id: fields.idOf("limits/methods/" + method), checked: chosen.includes(method), onchange: () => shown.send({ type: "toggle", value: method }) }), method));
    return group("What may be used",
      el("div", { class: hooks.choices, role: "group", "aria-label": "Methods; none chosen means any" }, methods),
      el("div", { class: hooks.fields },
        fields.text(shown, "Temperature of the etch", "temperature", { placeholder: "80 degC, room", kind: hooks.narrow }),
        fields.text(shown, "Hottest the sample may get", "limits/temperature", { placeholder: "120 degC", kind: hooks.narrow }),
        fields.named(shown, "Carrier", "mount/carrier", shown.entries, { placeholder: "a film, or words", freeWords: true }),
        fields.text(shown, "Held by", "mount/bond", { placeholder: "thermal wax" })),
      listedLimits(shown));
  }

  /** Limits that only a file states, with a way to drop them. @param {any} shown */
  function listedLimits(shown) {
    const limits = shown.state.file.limits || {};
    return ["tools", "etchants"].filter((name) => limits[name]).map((name) =>
      ew.dom.el("p", { class: ew.hooks.quiet }, "Only these " + name + ": " + limits[name].join(", ") + ". ",
        button("Allow any", () => shown.send({ type: "set", field: "limits/" + name, value: "", rebuild: true }))));
  }

  /** @param {any} shown @param {any} step @param {number} index */
  function stepRow(shown, step, index) {
    const { el } = ew.dom;
    const hooks = ew.hooks;
    const fields = ew.viewFields;
    const field = "steps/" + index;
    const isEtch = step.etch !== undefined;
    const recipes = [["any", "any recipe"], ...Object.values(shown.data.facts.etches).map((/** @type {any} */ one) => [one.id, one.name])];
    const inside = isEtch
      ? [fields.choice(shown, "Etch by", field + "/etch", recipes, hooks.wide)]
      : [
          fields.choice(shown, "Treatment", field + "/treat", TREATS, hooks.narrow),
          fields.named(shown, "In", field + "/etchant", shown.etchants, { placeholder: "acetone, developer …", kind: hooks.wide }),
          fields.text(shown, "For", field + "/time", { placeholder: "60 s", kind: hooks.narrow }),
          fields.text(shown, "At", field + "/temperature", { placeholder: "21 degC", kind: hooks.narrow }),
        ];
    return el("li", { class: hooks.row }, el("div", { class: hooks.fields }, inside, itemButtons(shown, "steps", index, shown.state.file.steps.length, "step " + (index + 1), true)));
  }

  /** @param {any} shown */
  function steps(shown) {
    const { el } = ew.dom;
    const list = shown.state.file.steps || [];
    return el("details", { class: ew.hooks.more, open: list.length > 0, id: "plan-steps-more" },
      el("summary", {}, "Steps between: develop, clean, strip"),
      el("ol", { class: ew.hooks.list }, list.map((/** @type {any} */ step, /** @type {number} */ index) => stepRow(shown, step, index))),
      addButton(shown, "steps", "Add a treatment", { treat: "develop" }, "treat"), " ",
      button("Add an etch", () => shown.send({ type: "add", list: "steps", value: { etch: "any" }, focus: ew.viewFields.idOf("steps/" + list.length + "/etch") })));
  }

  /** What an edge of the sample is said to be. @param {string} edge */
  function edgeWords(edge) {
    return (EDGES.find((one) => one[0] === edge) || EDGES[0])[1];
  }

  /** Where nothing is typed, what counts instead stands in the field; it changes with the thickness. @param {any} shown */
  function showDefaults(shown) {
    ew.mayLose.byField(shown.data.facts, shown.state.file).forEach(function (/** @type {string} */ words, /** @type {string} */ field) {
      const input = document.getElementById(ew.viewFields.idOf(field + "/allowed_loss"));
      if (input instanceof HTMLInputElement) input.placeholder = words || "20 nm, or any";
      const beside = document.getElementById(ew.viewFields.idOf(field + "/default"));
      if (beside) beside.textContent = words && input instanceof HTMLInputElement && !input.value ? " · " + (words.startsWith("no default") ? words : "may lose " + words) : "";
    });
  }

  /** The whole form. @param {any} shown */
  function form(shown) {
    return [...layers(shown), around(shown), goal(shown), limits(shown), steps(shown)];
  }

  ew.viewStack = Object.freeze({ form, button, edgeWords, showDefaults });
})((globalThis.etchwright = globalThis.etchwright || {}));
