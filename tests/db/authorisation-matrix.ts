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
};
