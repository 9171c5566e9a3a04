/** The worker's search: in threads of its own, so that its other jobs go on meanwhile. */
import type { RoundsSearch } from "@/lib/usecases/use-case";
import { Race } from "./race";

/** Two searches that exchange plans; always two, so that a plan does not hang on the machine. */
const THREADS = 2;

export const searchBeside: RoundsSearch = async ({ problem, turns, options, seed }, onNews) => {
  const race = new Race(THREADS);
  const told: Promise<void>[] = [];
  let wanted = true;
  const task = { problem, options, seed, limit: { kind: "turns", turns } } as const;
  try {
    const end = await race.run(task, ({ share, rank }) => {
      const answer = onNews({ share, cost: rank }).then(async (word) => {
        if (word === "enough") race.stop();
        if (word !== "drop") return;
        wanted = false;
        await race.close();
      });
      answer.catch(() => {});
      told.push(answer);
    });
    await Promise.all(told);
    return wanted ? end.routes : null;
  } catch (error) {
    if (!wanted) return null;
    throw error;
  } finally {
    await race.close();
  }
};
