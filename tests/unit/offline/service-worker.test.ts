/**
 * The service worker itself, run against stand-ins of the caches and the network that behave as the
 * Service Worker and Cache specifications (W3C) say. What must hold is the issue's own wording:
 * "survives the app being updated half-way".
 */
import { readFileSync } from "node:fs";
import { createContext, runInContext } from "node:vm";
import { beforeEach, describe, expect, it } from "vitest";

const SOURCE = readFileSync(new URL("../../../public/service-worker.js", import.meta.url), "utf8");
const ORIGIN = "https://phone.example";

class Shelf {
  readonly kept = new Map<string, Response>();
  key = (asked: string | { url: string }) =>
    new URL(typeof asked === "string" ? asked : asked.url, ORIGIN).pathname;
  match = async (asked: string | { url: string }) => this.kept.get(this.key(asked))?.clone();
  put = async (asked: string, response: Response) => void this.kept.set(this.key(asked), response);
  add = async () => undefined;
  keys = async () => [...this.kept.keys()].map((path) => ({ url: ORIGIN + path }));
  delete = async (asked: { url: string }) => this.kept.delete(this.key(asked));
}

class Phone {
  readonly shelves = new Map<string, Shelf>();
  /** What the server answers, by path; a path that is missing cannot be reached. */
  server = new Map<string, string>();

  readonly caches = {
    keys: async () => [...this.shelves.keys()],
    delete: async (name: string) => this.shelves.delete(name),
    open: async (name: string) => {
      const shelf = this.shelves.get(name) ?? new Shelf();
      this.shelves.set(name, shelf);
      return shelf;
    },
    match: async (asked: string, { cacheName }: { cacheName: string }) =>
      this.shelves.get(cacheName)?.match(asked),
  };

  /** The worker of a version, as it runs after the browser has taken it over. */
  async worker(version: string) {
    const hears = new Map<string, (event: object) => void>();
    const self = {
      addEventListener: (name: string, listener: (event: object) => void) =>
        hears.set(name, listener),
      skipWaiting: async () => undefined,
      clients: { claim: async () => undefined },
      location: { origin: ORIGIN },
    };
    const fetch = async (asked: string | { url: string }) => {
      const path = new URL(typeof asked === "string" ? asked : asked.url, ORIGIN).pathname;
      const body = this.server.get(path);
      if (body === undefined) throw new TypeError("no network");
      const response = new Response(body);
      Object.defineProperty(response, "type", { value: "basic" });
      return response;
    };
    const source = SOURCE.replace(/const VERSION = "[^"]+"/, `const VERSION = "${version}"`);
    const world = {
      self,
      caches: this.caches,
      fetch,
      URL,
      setTimeout,
      Response,
      Error,
      Set,
      Promise,
    };
    runInContext(source, createContext(world));
    const run = async (name: string, event: object) => {
      const waits: Promise<unknown>[] = [];
      hears.get(name)?.({ ...event, waitUntil: (work: Promise<unknown>) => waits.push(work) });
      await Promise.all(waits);
    };
    await run("install", {});
    await run("activate", {});
    return {
      keep: (parts: string[]) => run("message", { data: { act: "keep", parts } }),
      forget: () => run("message", { data: { act: "forget" } }),
      async open(path: string): Promise<string | null> {
        let answer: Promise<Response> | null = null;
        const request = { method: "GET", url: ORIGIN + path, mode: "navigate" };
        hears.get("fetch")?.({
          request,
          respondWith: (given: Promise<Response>) => (answer = given),
        });
        if (!answer) return null;
        return (answer as Promise<Response>).then((r) => r.text()).catch(() => null);
      },
    };
  }

  /** A build: its pages name a script, and that script loads a part that no page names. */
  deploy(build: string): void {
    const html = `<script src="/_next/static/${build}.js" async></script><script src="/_next/static/old-browsers.js" noModule></script> ${build}`;
    for (const page of ["today", "stop", "log", "swap", "cannot", "find", "outbox"]) {
      this.server.set(`/${page}`, html);
    }
    for (const part of [build, `${build}-swap`, "old-browsers"]) {
      this.server.set(`/_next/static/${part}.js`, part);
    }
  }

  parts = (build: string) => [`/_next/static/${build}.js`, `/_next/static/${build}-swap.js`];
}

let phone: Phone;
beforeEach(() => {
  phone = new Phone();
});

async function expectWhole(worker: Awaited<ReturnType<Phone["worker"]>>, build: string) {
  phone.server.clear();
  expect(await worker.open("/today")).toContain(build);
  expect(await worker.open("/swap")).toContain(build);
  for (const part of phone.parts(build)) {
    expect(await worker.open(part), part).toBe(part.replace(/.*\/|\.js/g, ""));
  }
}

describe("an update that got half-way", () => {
  it("a new worker without network still serves what the old one kept", async () => {
    phone.deploy("first");
    await (await phone.worker("1")).keep(phone.parts("first"));
    phone.server.clear();
    await expectWhole(await phone.worker("2"), "first");
  });

  it("new pages of which a part did not arrive stay unused", async () => {
    phone.deploy("first");
    const worker = await phone.worker("1");
    await worker.keep(phone.parts("first"));
    phone.deploy("second");
    phone.server.delete("/_next/static/second-swap.js");
    await worker.keep(phone.parts("second")).catch(() => undefined);
    await expectWhole(worker, "first");
  });

  it("an old page that is still open does not get a half known new version kept", async () => {
    phone.deploy("first");
    const worker = await phone.worker("1");
    await worker.keep(phone.parts("first"));
    phone.deploy("second");
    await worker.keep(phone.parts("first"));
    await expectWhole(worker, "first");
  });

  it("once a new version is whole, it is used and nothing of the old one stays", async () => {
    phone.deploy("first");
    await (await phone.worker("1")).keep(phone.parts("first"));
    phone.deploy("second");
    const worker = await phone.worker("2");
    await worker.keep(phone.parts("second"));
    expect([...phone.shelves.keys()].every((name) => name.endsWith("-2"))).toBe(true);
    await expectWhole(worker, "second");
    expect(await worker.open("/_next/static/first.js")).toBeNull();
  });
});

it("signing out takes the pages off the phone, those of an older worker too", async () => {
  phone.deploy("first");
  await (await phone.worker("1")).keep(phone.parts("first"));
  const worker = await phone.worker("2");
  await worker.forget();
  phone.server.clear();
  expect(await worker.open("/today")).toBeNull();
});
