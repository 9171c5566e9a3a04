const NAMES: Readonly<Record<string, string>> = {
  height: "work at height",
  boat: "boat",
  confined_space: "confined spaces",
  roadside: "roadside",
  explosive_atmosphere: "explosive atmospheres",
};

/** A ticket (a proof of training) in words. */
export function ticketName(ticket: string): string {
  return NAMES[ticket] ?? ticket.replaceAll("_", " ");
}

/** "boat, confined spaces". */
export function ticketNames(tickets: readonly string[]): string {
  return tickets.map(ticketName).join(", ");
}
