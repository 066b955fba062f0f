// @ts-check
/* Wires data, state, address bar and page together. */
(function (ew) {
  "use strict";

  const PAUSE_MS = 150;
  if (!document.querySelector(ew.hooks.root)) return;
  const data = ew.data.read(/** @type {any} */ (window).etchwrightFacts);
  const lab = data.facts.defaults.confidence;
  let state = ew.state.initial(lab);
  const show = ew.view.page(data, send);
  let written = "";
  let timer = 0;

  function send(/** @type {any} */ action) {
    state = ew.state.after(state, action);
    clearTimeout(timer);
    // Browsers count how often the address changes; once typing pauses is enough.
    if (!action.fromAddress) timer = window.setTimeout(write, PAUSE_MS);
    show(state, action.focus);
  }

  function write() {
    written = ew.address.encode(state.file, state.confidence === lab ? null : state.confidence, state.etchant);
    history.replaceState(null, "", written);
  }

  function restore() {
    const found = ew.address.decode(location.hash, data.facts);
    send({ type: "load", fromAddress: true, value: found.file || ew.sampleFile.empty(), confidence: found.confidence || lab, etchant: found.etchant, notices: found.notices });
  }

  ew.view.begin();
  ew.viewBar.wire(data, () => state, send);
  // Only what somebody else wrote there: a link that was pasted, a step back.
  window.addEventListener("hashchange", () => location.hash !== written && restore());
  restore();
})((globalThis.etchwright = globalThis.etchwright || {}));
