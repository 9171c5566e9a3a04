import { DEGREES, type FieldSpec, MONEY, WHOLE } from "./field-spec";

/** Stored words as files may write them: with spaces, hyphens or underscores. */
function words(...stored: readonly string[]): Record<string, string> {
  return Object.fromEntries(stored.map((word) => [word.replaceAll("_", ""), word]));
}

const TICKETS = words("height", "boat", "confined_space", "roadside", "explosive_atmosphere");
const HAZARDS = words(
  "water",
  "height",
  "confined_space",
  "roadside",
  "explosive_atmosphere",
  "lone_working",
  "livestock",
  "soft_ground",
);

function text(key: string, label: string, heads: readonly string[], longest = 200): FieldSpec {
  return { key, label, type: "text", longest, heads };
}

const SITE_FIELDS: readonly FieldSpec[] = [
  { ...text("site", "Site code", ["site", "site id", "location code"], 100), required: true },
  text("siteName", "Site name", ["location", "place"]),
  {
    ...{ key: "latitude", label: "Latitude", type: "scaled", units: DEGREES },
    ...{ min: -90e7, max: 90e7, heads: ["lat", "site latitude"] },
  },
  {
    ...{ key: "longitude", label: "Longitude", type: "scaled", units: DEGREES },
    ...{ min: -180e7, max: 180e7, heads: ["lon", "lng", "long", "site longitude"] },
  },
  text("crew", "Crew", ["crew name", "team"]),
  text("climate", "Climate", ["climate name"]),
  {
    ...{ key: "notice", label: "Notice days", type: "scaled", units: WHOLE, min: 0, max: 120 },
    heads: ["notice", "days notice", "notice needed", "notice needed days"],
  },
  { key: "opens", label: "Opens", type: "clock", heads: ["open from", "opens at"] },
  { key: "closes", label: "Closes", type: "clock", heads: ["open until", "closes at"] },
  text("closed", "Closed seasons", ["closed season", "closed", "closures"]),
  text("keyCode", "Key", ["key code", "gate code", "key number"], 100),
  text("contactName", "Contact name", ["contact", "site contact"]),
  text("contactEmail", "Contact email", ["email", "contact e-mail"]),
  text("contactPhone", "Contact phone", ["phone", "telephone"], 100),
  { key: "hazards", label: "Hazards", type: "choices", words: HAZARDS, heads: ["hazard"] },
  {
    ...{ key: "tickets", label: "Tickets needed", type: "choices", words: TICKETS },
    heads: ["tickets", "ticket"],
  },
  text("driveUp", "Drive-up notes", ["drive up", "access notes", "access", "directions"], 2000),
];

/** An asset with its site; the site's columns may be left out once the site is known. */
export const ASSET_FIELDS: readonly FieldSpec[] = [
  {
    ...{ key: "tag", label: "Tag", type: "text", longest: 40, required: true },
    pattern: /^[A-Za-z0-9][A-Za-z0-9._/-]*$/,
    heads: ["asset tag", "asset", "asset id"],
  },
  {
    ...text("name", "Name", ["asset name", "description", "asset description"]),
    required: true,
  },
  { ...text("model", "Device model", ["model", "device", "model name"]), required: true },
  ...SITE_FIELDS,
  {
    ...{ key: "state", label: "State", type: "choice", heads: ["asset state", "status"] },
    words: {
      inservice: "in_service",
      service: "in_service",
      active: "in_service",
      stored: "stored",
      retired: "retired",
    },
  },
  text("firmware", "Firmware", ["firmware version"], 100),
  {
    ...{ key: "silence", label: "Cost of an hour without data", type: "scaled", units: MONEY },
    ...{ min: 0, max: 100_000_000 },
    heads: ["silence cost", "silence cost per hour", "criticality", "cost per hour without data"],
  },
  text("note", "Note", ["notes", "asset note", "remarks"], 2000),
];
