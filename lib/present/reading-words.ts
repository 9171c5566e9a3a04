const REASONS: Readonly<Record<string, string>> = {
  fits: "fits the curve",
  doubtful: "does not fit the curve",
  passivation: "a lithium cell still waking up under load",
  "before-install": "read before this pack went in",
  impossible: "cannot be this pack's voltage",
};

const SOURCES: Readonly<Record<string, string>> = {
  form: "office",
  csv: "file",
  api: "gateway",
  phone: "phone",
};

/** Why a reading counts as much as it does, from the battery core's word. */
export function readingReason(reason: string): string {
  return REASONS[reason] ?? reason;
}

/** How a reading came in, where nobody's name stands beside it. */
export function readingSource(source: string): string {
  return SOURCES[source] ?? source;
}
