import type { DayPack } from "@/lib/sync/day-pack";
import type { EntryBody } from "@/lib/sync/entries";
import { mergeDay } from "@/lib/sync/merge-day";
import { countOutbox, type OutboxCount, type OutboxEntry, waitMs } from "@/lib/sync/outbox";
import { countPhotos, type KeptPhoto } from "@/lib/sync/outbox-photos";
import {
  deviceId,
  type FieldDatabase,
  forgetPerson,
  keepDay,
  keepSkew,
  type KnownPerson,
  readDay,
  readPerson,
  readSkew,
  storageFault,
} from "./database";
import type { FlushEnd } from "./flush";
import type { Picture, Shrink } from "./keep-with-photos";
import { oneAtATime } from "./one-at-a-time";
import {
  allEntries,
  discardEntry,
  keepEntries,
  mendEntry,
  type NewEntry,
  pruneEntries,
} from "./outbox-store";
import { allPhotos, dropPhoto } from "./photo-store";
import type { Transport } from "./transport";

export interface FieldSnapshot {
  readonly phase: "opening" | "ready" | "no-store";
  readonly person: KnownPerson | null;
  /** The server's day with this person's entries laid over it. */
  readonly day: DayPack | null;
  readonly entries: readonly OutboxEntry[];
  readonly photos: readonly KeptPhoto[];
  readonly count: OutboxCount & { readonly photos: number };
  /** Whether the last call got through. */
  readonly signal: boolean;
  readonly busy: boolean;
  readonly signedOut: boolean;
  /** How far this phone's clock is ahead, in ms, as last heard. */
  readonly skewMs: number;
  /** What the person should know of what was kept last; null: all went as it should. */
  readonly told: string | null;
  /** A newer page has taken the store over: this one must be loaded anew. */
  readonly outdated: boolean;
}

/** What the store needs from the machine; tests give their own. */
export interface FieldMachine {
  readonly open: (outdated: () => void) => Promise<FieldDatabase>;
  readonly transport: Transport;
  readonly now: () => Date;
  readonly newId: () => string;
  readonly chance: () => number;
  readonly later: (work: () => void, ms: number) => void;
  /** Tells the other tabs of this phone that something changed. */
  readonly announce: () => void;
  readonly shrink: Shrink;
  /** Asks the browser to send what is left when there is signal, page or no page. */
  readonly sendInBackground: () => void;
}

export const NOTHING_YET: FieldSnapshot = {
  phase: "opening",
  person: null,
  day: null,
  entries: [],
  photos: [],
  count: { toSend: 0, refused: 0, others: 0, photos: 0 },
  signal: true,
  busy: false,
  signedOut: false,
  skewMs: 0,
  told: null,
  outdated: false,
};

/** The field pages' one source: what is kept on the phone, and its traffic with the server. */
export class FieldStore {
  private snapshot = NOTHING_YET;
  private readonly listeners = new Set<() => void>();
  private opened: Promise<FieldDatabase> | null = null;
  private raw: DayPack | null = null;
  private failures = 0;

  constructor(private readonly machine: FieldMachine) {}

  readonly getSnapshot = (): FieldSnapshot => this.snapshot;
  readonly getServerSnapshot = (): FieldSnapshot => NOTHING_YET;
  readonly subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };

  /** Reads what the phone keeps, then calls the server. */
  async start(): Promise<void> {
    try {
      await this.reload();
    } catch {
      this.set({ phase: "no-store" });
      return;
    }
    await this.exchange();
  }

  /** Reads everything anew, after a change here or in another tab. */
  readonly reload = async (): Promise<void> => {
    const db = await this.db();
    const person = await readPerson(db);
    this.raw = person ? await readDay(db, person.id) : null;
    const [entries, photos, skewMs] = [
      await allEntries(db),
      await allPhotos(db),
      await readSkew(db),
    ];
    const day = this.raw && mergeDay(this.raw, entries);
    const id = person?.id ?? "";
    const count = { ...countOutbox(entries, id), photos: countPhotos(photos, id) };
    this.set({ phase: "ready", person, day, entries, photos, count, skewMs });
  };

  /**
   * Keeps what a person entered and starts to send it.
   * @returns what to say when the phone could not keep it; null when it is kept
   */
  async keep(...bodies: readonly EntryBody[]): Promise<string | null> {
    return this.write((db, entry) => keepEntries(db, bodies.map(entry)));
  }

  /** The same for one entry with photos; where they do not fit, `told` says what became of them. */
  async keepSeen(body: EntryBody, pictures: readonly Picture[]): Promise<string | null> {
    if (pictures.length === 0) return this.keep(body);
    const { shrink } = this.machine;
    return this.write(async (db, entry) => {
      const { keepWithPhotos } = await import("./keep-with-photos");
      this.set({ told: await keepWithPhotos(db, entry(body), pictures, shrink) });
    });
  }

  /** Gives a photo up that the server will not have. */
  async discardPhoto(id: string): Promise<string | null> {
    return this.write((db) => dropPhoto(db, id));
  }

  /** Sends a refused entry anew, mended; `happenedAt` stays unless given. */
  async mend(refused: OutboxEntry, body: EntryBody): Promise<string | null> {
    const { happenedAt } = refused;
    return this.write((db, entry) => mendEntry(db, refused.id, { ...entry(body), happenedAt }));
  }

  async discard(id: string): Promise<string | null> {
    return this.write((db) => discardEntry(db, id));
  }

  /** Forgets the person and their day on this phone; what is still to be sent stays. */
  async forget(): Promise<void> {
    await forgetPerson(await this.db());
    await this.reload();
    this.machine.announce();
  }

  /** Sends what is kept, then loads the day. One tab at a time; a failure is tried again. */
  readonly exchange = async (): Promise<void> => {
    if (this.snapshot.busy || this.snapshot.phase !== "ready") return;
    this.set({ busy: true });
    const end = await oneAtATime("wanewright-field", () => this.sendAndLoad()).catch(
      () => "again" as const,
    );
    this.set({ busy: false });
    await this.reload();
    if (end === "again") {
      this.failures += 1;
      const wait = waitMs(this.failures, this.machine.chance());
      this.machine.later(() => void this.exchange(), wait);
    } else if (end !== null) this.failures = 0;
  };

  private async sendAndLoad(): Promise<FlushEnd> {
    const db = await this.db();
    const sent = await this.send(db);
    if (sent === "signed-out") return this.signedOut();
    const answer = await this.machine.transport.loadDay();
    if (answer.kind === "signed-out") return this.signedOut();
    this.set({ signal: answer.kind !== "cut" });
    if (answer.kind !== "good") return "again";
    const day = answer.value;
    await keepSkew(db, this.machine.now().getTime() - Date.parse(day.madeAt));
    const changedHands = day.person.id !== this.snapshot.person?.id;
    await keepDay(db, day);
    await pruneEntries(db, day.madeAt, day.person.id);
    this.set({ signedOut: false });
    this.machine.announce();
    await this.reload();
    return changedHands ? this.send(db) : sent;
  }

  private async send(db: FieldDatabase): Promise<FlushEnd> {
    const { person } = this.snapshot;
    if (!person) return "sent";
    const changed = async () => {
      await this.reload();
      this.machine.announce();
    };
    const { transport, newId } = this.machine;
    const device = await deviceId(db, newId);
    const { flushAll } = await import("./flush-all");
    return flushAll({ db, transport, deviceId: device, personId: person.id, changed });
  }

  private signedOut(): FlushEnd {
    this.set({ signedOut: true, signal: true });
    return "signed-out";
  }

  private async write(
    work: (db: FieldDatabase, entry: (body: EntryBody) => NewEntry) => Promise<void>,
  ): Promise<string | null> {
    const { person } = this.snapshot;
    if (!person) return "Sign in first, so that it is known whose entry this is.";
    const { now, newId } = this.machine;
    const happenedAt = now().toISOString();
    this.set({ told: null });
    const entry = (body: EntryBody) => ({ id: newId(), personId: person.id, happenedAt, body });
    try {
      await work(await this.db(), entry);
    } catch (error) {
      return storageFault(error);
    }
    this.machine.sendInBackground();
    await this.reload();
    this.machine.announce();
    void this.exchange();
    return null;
  }

  private db(): Promise<FieldDatabase> {
    this.opened ??= this.machine.open(() => this.set({ outdated: true }));
    return this.opened;
  }

  private set(change: Partial<FieldSnapshot>): void {
    this.snapshot = { ...this.snapshot, ...change };
    for (const listener of this.listeners) listener();
  }
}
