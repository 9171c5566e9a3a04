import { CURRENT, type FieldSpec, TEMPERATURE, VOLTAGE, WHOLE } from "./field-spec";

const TAG = { key: "tag", label: "Tag", type: "text", longest: 40, required: true } as const;

/** A pack put into an asset, and how it came out. */
export const INSTALL_FIELDS: readonly FieldSpec[] = [
  { ...TAG, heads: ["asset", "asset tag", "device"] },
  {
    key: "installed",
    label: "Installed at",
    type: "instant",
    required: true,
    heads: ["installed", "install date", "installed on", "fitted", "fitted on", "date in"],
  },
  {
    key: "cells",
    label: "Cell type",
    type: "text",
    required: true,
    heads: ["cells", "cell", "designation", "battery", "battery type"],
  },
  {
    ...{ key: "series", label: "Series", type: "scaled", units: WHOLE, min: 1, max: 24 },
    heads: ["cells in series"],
  },
  {
    ...{ key: "parallel", label: "Parallel", type: "scaled", units: WHOLE, min: 1, max: 12 },
    heads: ["cells in parallel"],
  },
  { key: "lot", label: "Lot", type: "text", heads: ["lot code", "batch", "batch code"] },
  {
    key: "made",
    label: "Made on",
    type: "day",
    heads: ["made", "date code", "manufactured", "manufactured on", "cells made on"],
  },
  {
    key: "removed",
    label: "Removed at",
    type: "instant",
    heads: ["removed", "removed on", "taken out", "date out", "out at"],
  },
  {
    key: "reason",
    label: "Reason out",
    type: "choice",
    heads: ["reason", "why out", "removal reason"],
    words: {
      due: "due",
      early: "early",
      foundstopped: "found_stopped",
      stopped: "found_stopped",
      dead: "found_stopped",
      flat: "found_stopped",
      fault: "fault",
      faulty: "fault",
      deviceremoved: "device_removed",
      other: "other",
    },
  },
  {
    key: "voltageOut",
    label: "Voltage out",
    type: "scaled",
    units: VOLTAGE,
    min: 0,
    max: 60_000,
    heads: ["volts out", "out voltage", "removed voltage", "voltage at removal"],
  },
  {
    key: "stopped",
    label: "Stopped at",
    type: "instant",
    heads: ["stopped", "stopped on", "died at", "failed at"],
  },
  { key: "look", label: "Look of the cells", type: "text", heads: ["look", "look out", "remarks"] },
];

/** A voltage of the pack that was in the asset then. */
export const READING_FIELDS: readonly FieldSpec[] = [
  { ...TAG, heads: ["asset", "asset tag", "device"] },
  {
    key: "at",
    label: "Read at",
    type: "instant",
    required: true,
    heads: ["at", "time", "timestamp", "date", "date time", "when", "read on", "read"],
  },
  {
    key: "voltage",
    label: "Voltage",
    type: "scaled",
    units: VOLTAGE,
    // What cannot be is told by the pack; here only slips of the file itself.
    min: -1_000_000,
    max: 1_000_000,
    required: true,
    heads: ["volts", "millivolts", "v", "mv", "pack voltage", "reading", "value"],
  },
  {
    key: "kind",
    label: "Kind",
    type: "choice",
    heads: ["resting or loaded", "reading kind", "condition", "state", "type"],
    words: {
      resting: "resting",
      rest: "resting",
      open: "resting",
      opencircuit: "resting",
      loaded: "loaded",
      load: "loaded",
      underload: "loaded",
    },
  },
  {
    key: "load",
    label: "Load current",
    type: "scaled",
    units: CURRENT,
    min: 1,
    max: 2_000_000_000,
    heads: ["load", "current"],
  },
  {
    key: "temperature",
    label: "Temperature",
    type: "scaled",
    units: TEMPERATURE,
    min: -600,
    max: 1000,
    heads: ["temp", "air temperature"],
  },
  {
    key: "accuracy",
    label: "Accuracy",
    type: "scaled",
    units: [
      { name: "mV", digits: 0 },
      { name: "V", digits: 3 },
    ],
    min: 1,
    max: 5000,
    heads: ["instrument accuracy", "meter accuracy"],
  },
  { key: "instrument", label: "Instrument", type: "text", longest: 100, heads: ["meter"] },
  { key: "note", label: "Note", type: "text", heads: ["notes", "comment", "remarks"] },
];
