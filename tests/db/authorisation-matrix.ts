/**
 * Who may do what, written by hand: the second opinion against which every use case is tried.
 *
 * One line a use case, "name": "who". The letters:
 *   A administrator   D dispatcher   S supervisor   T technician
 *   W the worker acting by itself    V a visitor who has not signed in
 *   r an API key with register:read  w an API key with readings:write
 *
 * A new use case needs a line here before authorisation-matrix.test.ts passes. Write down who
 * should be let in, from the roles in the README, not what the code says.
 */
export const MATRIX: Readonly<Record<string, string>> = {
  // Coming in and going out
  "sign-in-with-password": "ADST V",
  "sign-in-with-token": "ADST V",
  "request-sign-in-link": "ADST V",
  "request-password-link": "ADST V",
  "read-link": "ADST V",
  "choose-password": "ADST V",
  "accept-invitation": "ADST V",
  "change-own-password": "ADST",
  "sign-out": "ADST",
  "sign-out-everywhere": "ADST",
  "read-health": "W",
  "found-organisation": "W",

  // People and settings
  "list-people": "A",
  "read-person": "A",
  "invite-person": "A",
  "invite-again": "A",
  "change-person": "A",
  "switch-person": "A",
  "read-organisation": "ADST W",
  "change-organisation": "A",
  "list-api-keys": "A",
  "create-api-key": "A",
  "revoke-api-key": "A",
  "list-digest-choices": "ADS",
  "choose-digest": "ADS",
  "send-digests": "W",
  "list-mails": "A",
  "retry-mail": "A",
  "deliver-mail": "W",
  "list-audit": "AS",
  "list-climates": "ADS",
  "save-climate": "A",
  "remove-climate": "A",

  // Crews and technicians
  "list-crews": "ADS",
  "save-depot": "A",
  "remove-depot": "A",
  "save-crew": "A",
  "remove-crew": "A",
  "save-van": "A",
  "remove-van": "A",
  "read-technician": "ADS",
  "save-technician": "A",
  "remove-technician": "A",
  "record-absence": "AD",
  "remove-absence": "AD",

  // Horizon and Record
  "read-horizon": "ADS",
  "export-horizon": "ADS",
  "read-trust": "ADS",
  "read-costs": "ADS",
  "refresh-forecasts": "W",
  "judge-history": "W",

  // The register
  "list-assets": "ADS r",
  "read-asset": "ADS r",
  "read-asset-form": "AD",
  "save-asset": "AD",
  "change-asset-state": "AD",
  "list-sites": "ADS r",
  "read-site-form": "ADS",
  "save-site": "AD",
  "list-device-models": "ADS r",
  "read-device-model-form": "ADS",
  "save-device-model": "AD",
  "read-cell-type-form": "ADS",
  "save-cell-type": "AD",
  "upload-import": "AD",
  "read-import": "AD",
  "read-import-progress": "AD",
  "list-imports": "AD",
  "check-import": "AD",
  "apply-import": "AD",
  "run-import-check": "W",
  "run-import-apply": "W",

  // Packs, voltages and cells
  "record-reading": "ADT",
  "post-readings": "AD w",
  "give-verdict": "AD",
  "install-pack": "ADT",
  "remove-pack": "AD",
  "record-swap": "ADT",
  "read-swap-choices": "ADT",
  "measure-draw": "ADT",
  "sync-entries": "ADT",
  "read-stores": "ADS",
  "list-lots": "ADS",
  "list-stock-moves": "ADS",
  "receive-lot": "AD",
  "count-cells": "ADT",
  "move-cells": "ADT",

  // Forecasts, plans and the record
  "edit-plan": "AD",
  "undo-plan-edit": "AD",
  "discard-plan": "AD",
  "price-plan-act": "ADS",
  "export-list": "ADS",
  "plan-week": "AD",
  "run-plan-job": "W",
  "improve-plan": "AD",
  "revise-plan": "AD",
  "lock-stop": "AD",
  "mark-absent": "AD",
  "price-plan-options": "ADS",
  "preview-publication": "ADS",
  "publish-plan": "AD",
  "read-rounds-board": "ADS",
  "read-round-sheet": "ADST",
  "read-calendar-start": "ADS",
  "read-calendar": "ADS",
  "read-map": "ADS",
  "read-field-day": "ADT",
};
