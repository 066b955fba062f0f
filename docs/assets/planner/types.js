// @ts-check
/**
 * The shapes that the planner's scripts pass to each other, for whoever checks them with TypeScript. No page
 * loads this file. Records keep the names they arrive with; what is computed has names of ours.
 *
 * @typedef {{low: number, high: number}} Extent
 * @typedef {{low: number, mid: number | null, high: number | null}} Band nm/s
 * @typedef {{low: number | null, mid: number | null, high: number | null}} Span
 * @typedef {{kind: string, low: number | null, high: number | null, sigma: number, rank: string, source: string, tested_s: number | null, temperature: Extent | null, per_cycle: boolean}} PublishedFact
 * @typedef {{effect: string, words: string, source: string, temperature: Extent | null}} SaidFact
 * @typedef {{confidence: number, low: number, mid: number | null, high: number}} LevelBand
 * @typedef {{levels: LevelBand[], runs: number, limits: number, times: Extent, limit_s: number | null, temperature: Extent | null, load_cm2: Extent | null, window_nm: Extent | null, induction_s: number | null, stale_days: number | null}} OwnFact
 * @typedef {{forbidden: boolean, words: string, from_nm: number}} GasFact
 * @typedef {{id: string, name: string, method: string, state: string, isotropic: boolean, gas_bubbles: boolean, hf_vapour: boolean, temperature: Extent | null, hazard: number, cautions: string[], rows: {[film: string]: PublishedFact[]}, said: {[film: string]: SaidFact[]}, gas: {[film: string]: GasFact[]}, alone: {[film: string]: GasFact[]}, bond: GasFact[]}} EtchantFacts
 * @typedef {{film: string, on: string[], longest_s: number}} MaskFact
 * @typedef {{id: string, name: string, etchant: string, method: string, tool: string, status: string, inherits: boolean, targets: string[], phi: number, offset_s: number, transfer_s: number, overetch: number, endpoint: boolean, cooled: boolean, isotropic: boolean, temperature: Extent | null, cycle_s: number | null, ratio: Span | null, masks: MaskFact[], own: {[film: string]: OwnFact}, gas: {[film: string]: GasFact[]}, forbidden: string[], cautions: string[], clearing: string, if_not_cleared: string}} EtchFacts
 * @typedef {{id: string, name: string, family: string, is_family: boolean, members: string[], barrier: string, electrical: string | null, noble: boolean, similar: string[], adhesion: string[], names: string[], formula: string}} FilmFacts
 * @typedef {{films: string[], etchants: string[], effect: string, words: string, source: string, affects: string | null}} CoupleFact
 * @typedef {{rule: string, forbidden: boolean, words: string, pairs: string[][]}} MeetingFact
 * @typedef {{under_fraction: number, under_nm: number, other_fraction: number, other_nm: number, other_least_nm: number, reserve_resist_plasma_fraction: number, reserve_resist_plasma_nm: number, reserve_fraction: number, reserve_nm: number, none_below_nm: number}} Allowance
 * @typedef {{confidence: number, tolerance: number, phi_immersion: number, phi_bubbles: number, phi_vapour: number, phi_plasma: number, phi_cyclic: number, reaction_wet_s: number, reaction_plasma_s: number, allowance: Allowance}} Defaults
 * @typedef {{first_look_fraction: number, timed_ratio: number, untested_limit_s: number, good_margin: number, run_span: number[], temperature_match_k: number, room_temperature_k: number[], isotropic_undercut: number, reference_confidence: number, two_faces: number}} Rules
 * @typedef {{symbol: string, factor: number, divisor: number, offset: number, spellings: string[]}} Unit
 * @typedef {{signed: boolean, canonical: string, bySpelling: Map<string, Unit>}} UnitsOf
 * @typedef {Map<string, UnitsOf>} UnitTable
 * @typedef {{text: string, unit: string, form: string, value: number | null, halfWidth: number | null, low: number | null, high: number | null}} Quantity
 * @typedef {{etchant: EtchantFacts, recipe: EtchFacts | null, known: Map<string, Map<string, Evidence>>}} Etching `known` keeps the evidence found so far, by what was asked and film
 * @typedef {{format: number, as_of: string, defaults: Defaults, films: {[id: string]: FilmFacts}, etchants: {[id: string]: EtchantFacts}, etches: {[id: string]: EtchFacts}, refused: {[tool: string]: {[film: string]: string}}, couples: CoupleFact[], meetings: MeetingFact[], bondPattern: RegExp | null, families: FilmFacts[], etchings: Etching[], alone: Map<string, Etching>, couplings: Map<string, {films: string[], coupling: Coupling}[]>, standing: Map<string, (Excluded | null | undefined)[]>, tools: Map<string, string>, rules: Rules, quantiles: {confidence: number, quantile: number}[], units: UnitTable}} Facts
 * @typedef {{facts: Facts, reference: Facts, cards: {[recipe: string]: any}, legend: {[column: string]: string}, samples: any[], sources: {[id: string]: string}, lab: string}} PlannerData
 *
 * @typedef {{confidence: number, temperature: Extent | null, key: string}} Asked `key` names the question
 * @typedef {{rank: string, band: Band | null, limitS: number | null, attacked: boolean, adverse: string[], conflict: boolean, single: boolean, far: boolean, allTemperatures: boolean, hint: string | null, sources: string[], words: string[]}} Evidence
 * @typedef {{film: string, thicknessNm: number, role: string, tolerance: number, allowedNm: number | null, on: string | null, isCritical: boolean, exposed: string, spentNm: number | null, assumed: boolean}} PlanFilm
 * @typedef {{name: string, layers: PlanFilm[], exposed: PlanFilm[], back: PlanFilm | null, backProtected: boolean, edge: string | null, depthNm: number | null, throughWafer: boolean, lineNm: number | null, windowNm: number | null, loadCm2: number | null, methods: string[], tools: string[], etchants: string[], hottestK: number | null, carrier: string | null, bond: string | null, temperature: Extent | null}} PlanSample
 * @typedef {{treat: string | null, etch: string | null, etchant: string | null, timeS: number | null, temperature: Extent | null}} PlanStep
 * @typedef {{sample: PlanSample, target: PlanFilm, above: PlanFilm[], below: PlanFilm[]}} Stage
 * @typedef {{sample: PlanSample, removed: number, wetWith: string | null}} PlanState
 * @typedef {{depthNm: number, thicknessNm: number, tolerance: number, phi: number, offsetS: number, overetch: number, reactionS: number, through: boolean}} Cut
 * @typedef {{nominalS: number | null, clearFirstS: number | null, clearLastS: number | null, firstLookS: number | null, latestStopS: number | null, openFirstS: number | null, openMidS: number | null, openLastS: number | null}} Schedule
 * @typedef {{band: Band | null, cut: Cut, schedule: Schedule}} Timing
 * @typedef {{lowS: number, midS: number | null, highS: number}} Exposure
 * @typedef {{code: string, params: {[name: string]: any}}} Remark
 * @typedef {{film: PlanFilm, role: string, byTimer: Exposure | null, byLook: Exposure | null, faces: number, nextToTarget: boolean, liesOn: string | null, caps: Remark[]}} Case
 * @typedef {{facts: Facts, etching: Etching, asked: Asked, stage: Stage, timing: Timing, method: string, isWet: boolean, passesPores: boolean, reachesBack: boolean, startTimer: Exposure | null, startLook: Exposure | null}} Reach
 * @typedef {{caps: Map<string, Remark[]>, lost: Map<string, Remark>, planCaps: Remark[], notes: Remark[]}} Coupling
 * @typedef {{targetRank: string, caps: Remark[], undercut: Span, undercutByLook: Span}} PlanCaps
 * @typedef {{rank: string, targetRank: string, attacked: boolean, adverse: boolean, limitS: number | null}} Grounds
 * @typedef {{targetRank: string, allowed: number | null, lostAbove: number}} Bounds
 * @typedef {{verdict: string, ground: string}} Word
 * @typedef {{film: string, role: string, thicknessNm: number, exposure: Exposure | null, exposureByLook: Exposure | null, loss: Span, lossByLook: Span, allowedNm: number | null, verdict: string, verdictByLook: string, ground: string, groundByLook: string, rank: string, effects: string[], caps: Remark[], lost: Remark | null, hint: string | null, assumed: boolean, spentNm: number | null, sources: string[]}} FilmRow
 * @typedef {{recipe: string | null, etchant: string, method: string, verdict: string, verdictByLook: string, target: string | null, targetRank: string, targetBand: Band | null, targetSources: string[], schedule: Schedule, mode: string | null, undercut: Span, undercutByLook: Span, rows: FilmRow[], planCaps: Remark[], notes: Remark[], unstated: Remark[], proven: boolean, hazard: number, hasMargin: boolean, phi: number, offsetS: number, overetch: number, later: LaterTarget[], bares: string | null}} Option
 * @typedef {{film: string, thicknessNm: number, lossNm: number | null}} LaterTarget
 * @typedef {{recipe: string | null, etchant: string, reason: Remark}} Excluded
 * @typedef {{step: number, target: string | null, treat: string | null, etchant: string | null, timeS: number | null, stage: Stage, options: Option[], excluded: Excluded[]}} StagePlan
 * @typedef {{sample: string, asOf: string, confidence: number, stages: StagePlan[], isSequence: boolean}} Plan
 */
