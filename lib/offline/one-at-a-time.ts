/**
 * One tab at a time, by the Web Locks API where there is one. Without it tabs may send the same
 * entries at once; the server applies each once all the same, so that only traffic is lost.
 * @returns null when another tab is at it
 */
export async function oneAtATime<T>(name: string, work: () => Promise<T>): Promise<T | null> {
  if (!("locks" in navigator)) return work();
  return navigator.locks.request(name, { ifAvailable: true }, (lock) => (lock ? work() : null));
}
