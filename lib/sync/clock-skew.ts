const MS_PER_DAY = 86_400_000;
/** What the database's column holds without doubt. */
const MOST_RECORDED_MS = 21 * MS_PER_DAY;
/** Below this, sending itself explains the difference. */
const LEEWAY_MS = 60_000;

/** How far a phone's clock is ahead of ours (negative: behind), in ms, when it sent. */
export function clockSkewMs(sentAt: Date, receivedAt: Date): number {
  return sentAt.getTime() - receivedAt.getTime();
}

/** The skew as it is recorded: a clock off by more than three weeks is off by three weeks. */
export function recordedSkewMs(skewMs: number): number {
  return Math.round(Math.max(-MOST_RECORDED_MS, Math.min(MOST_RECORDED_MS, skewMs)));
}

/**
 * When something happened by our clock. The phone stamps entries and requests with the same
 * clock, so its error cancels; what it says is left alone while the error is within a minute.
 * Nothing happens after it was received.
 */
export function correctedInstant(happenedAt: Date, skewMs: number, receivedAt: Date): Date {
  const skew = Math.abs(skewMs) > LEEWAY_MS ? skewMs : 0;
  return new Date(Math.min(happenedAt.getTime() - skew, receivedAt.getTime()));
}
