// @ts-check
/* Every class and data hook of the planner's page; planner.css has a rule for each class. */
(function (ew) {
  "use strict";

  ew.hooks = Object.freeze({
    root: "[data-plan]",
    part: "data-plan-part",
    cardShown: "data-plan-card",
    drawing: "plan-drawing", beside: "plan-beside", list: "plan-list", row: "plan-row",
    rowTarget: "plan-row-target", fields: "plan-fields", field: "plan-field", wide: "plan-wide", narrow: "plan-narrow",
    fault: "plan-fault", button: "plan-button", small: "plan-small", buttons: "plan-buttons",
    group: "plan-group", more: "plan-more", choices: "plan-choices", choice: "plan-choice",
    best: "plan-best", jump: "plan-jump", bestLine: "plan-best-line", notices: "plan-notices", asked: "plan-asked",
    stage: "plan-stage", options: "plan-options", option: "plan-option", head: "plan-head", name: "plan-name",
    times: "plan-times", blocker: "plan-blocker", detail: "plan-detail", facts: "plan-facts",
    films: "plan-films", filmsBox: "plan-films-box", lossBar: "plan-loss-bar", quiet: "plan-quiet", excluded: "plan-excluded",
    card: "plan-card", cardHead: "plan-card-head", cardColumns: "plan-card-columns", cardBlock: "plan-card-block",
    cardBig: "plan-card-big", cardWrite: "plan-card-write", cardLine: "plan-card-line", cardCaution: "plan-card-caution",
    cardGiven: "plan-card-given", cardBox: "plan-card-box", cardSign: "plan-card-sign", cardBy: "plan-card-by",
    cardActions: "plan-card-actions", cardFoot: "plan-card-foot",
  });
})((globalThis.etchwright = globalThis.etchwright || {}));
