"use client";

import { useEffect, useState } from "react";

const MINUTE_MS = 60_000;

/** The phone's clock, once a minute. */
export function useNow(): Date {
  const [now, setNow] = useState(() => new Date());
  useEffect(() => {
    const timer = setInterval(() => setNow(new Date()), MINUTE_MS);
    return () => clearInterval(timer);
  }, []);
  return now;
}

/** A phone's clock may be a day off; within five minutes it is left alone. */
const LEEWAY_MS = 5 * 60_000;

/** The phone's time put right by what the server's clock said last. */
export function trueTime(now: Date, skewMs: number): Date {
  return Math.abs(skewMs) > LEEWAY_MS ? new Date(now.getTime() - skewMs) : now;
}
