// @ts-check
/* What stands above the form: name, examples, saving and loading, confidence, an etchant alone. */
(function (ew) {
  "use strict";

  /** @param {string} name @returns {any} */
  function control(name) {
    return document.getElementById("plan-bar-" + name);
  }

  /** Offers a text as a file. @param {string} name @param {string} text */
  function save(name, text) {
    const address = URL.createObjectURL(new Blob([text], { type: "application/json" }));
    const link = ew.dom.el("a", { href: address, download: name });
    document.body.append(link);
    link.click();
    link.remove();
    window.setTimeout(() => URL.revokeObjectURL(address), 1000);
  }

  /** A file name of a sample's name. @param {string} name */
  function fileName(name) {
    return (name.toLowerCase().replace(/[^a-z0-9]+/g, "-").replace(/^-|-$/g, "") || "sample") + ".json";
  }

  /** @param {File} file @param {(action: any) => void} send */
  async function load(file, send) {
    const found = ew.sampleFile.fromText(await file.text());
    if (!found.file) send({ type: "notice", notices: [found.fault] });
    else {
      const left = found.dropped.length ? ["Left out of the file, because no sample has it: " + found.dropped.join(", ") + "."] : [];
      send({ type: "load", value: found.file, notices: left });
    }
  }

  /** Makes the controls work. @param {PlannerData} data @param {() => any} state @param {(action: any) => void} send */
  function wire(data, state, send) {
    const { el } = ew.dom;
    const facts = data.facts;
    control("sample").addEventListener("input", () => send({ type: "set", field: "sample", value: control("sample").value.trim() }));
    control("example").append(...data.samples.map((sample, index) => el("option", { value: String(index) }, sample.sample)));
    control("example").addEventListener("change", function () {
      const sample = data.samples[Number(control("example").value)];
      if (control("example").value !== "" && sample) send({ type: "load", value: ew.sampleFile.cleaned(sample).file });
      control("example").value = "";
    });
    control("new").addEventListener("click", () => send({ type: "load", value: ew.sampleFile.empty() }));
    control("save").addEventListener("click", () => save(fileName(state().file.sample || "sample"), ew.sampleFile.toText(state().file)));
    control("load").addEventListener("change", function () {
      const file = control("load").files[0];
      if (file) load(file, send);
      control("load").value = "";
    });
    control("confidence").append(...facts.quantiles.map((one) => el("option", { value: String(one.confidence) }, Math.round(one.confidence * 1000) / 10 + " %")));
    control("confidence").addEventListener("change", () => send({ type: "confidence", value: Number(control("confidence").value) }));
    const byName = Object.values(facts.etchants).sort((one, other) => one.name.localeCompare(other.name));
    control("etchant").append(...byName.map((one) => el("option", { value: one.id }, one.name)));
    control("etchant").addEventListener("change", () => send({ type: "etchant", value: control("etchant").value }));
  }

  /** Shows a loaded state in the controls. @param {any} shown */
  function sync(shown) {
    control("sample").value = shown.state.file.sample || "";
    control("confidence").value = String(shown.state.confidence);
    control("etchant").value = shown.state.etchant || "";
  }

  ew.viewBar = Object.freeze({ wire, sync });
})((globalThis.etchwright = globalThis.etchwright || {}));
