/** One policy lived through from a start, and what it came to. */
import { closeLedger, type Result } from "./ledger";
import type { Start } from "./start";
import { liveWeek, type Policy } from "./week";

const DAYS_PER_YEAR = 365.25;

/** The whole years of a start under one policy. Same start, same policy: same result. */
export function live(start: Start, policy: Policy): Result {
  const { firstDay, lastDay, fleet } = start;
  const field = start.open();
  for (let monday = firstDay; monday < lastDay; monday += 7) {
    liveWeek(field, policy, monday, lastDay);
  }
  field.world.step(lastDay);
  field.close(lastDay);
  const deviceYears = (fleet.assets.size * (lastDay - firstDay)) / DAYS_PER_YEAR;
  return closeLedger(field.ledger, policy.name, fleet.seed, deviceYears);
}
