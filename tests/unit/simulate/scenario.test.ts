import { describe, expect, it } from "vitest";
import { buildScenario } from "@/scripts/simulate/scenario/build-scenario";
import { distanceToLine } from "@/scripts/simulate/scenario/geometry";
import { worldTime } from "@/scripts/simulate/scenario/local-time";
import { isAway } from "@/scripts/simulate/scenario/staff";

const NOW = new Date("2026-12-01T08:00:00Z");
const s = buildScenario(1, NOW);
const installed = s.packs.filter((p) => p.removedAt === null);

/** The size and the end state are the demonstration's own terms (PRODUCT's scenario). */
describe("the board at a moment", () => {
  it("is as large as it is meant to be", () => {
    expect(s.sites).toHaveLength(700);
    expect(s.assets.filter((a) => a.state === "in_service")).toHaveLength(1200);
    expect(installed).toHaveLength(1200);
    expect(s.technicians).toHaveLength(5);
    expect(s.models).toHaveLength(12);
    expect(new Set(s.cellTypes.map((c) => c.chemistry)).size).toBe(8);
    expect(s.readings.length).toBeGreaterThan(10_000);
  });

  it("has some packs out, more that stop within two weeks, and the rest spread over years", () => {
    const end = worldTime(NOW);
    const out = installed.filter((p) => s.world.stoppedAt(p.assetTag) !== null);
    const left = installed
      .filter((p) => !out.includes(p))
      .map((p) => (s.world.lookAhead(p.assetTag, 1_200) ?? Infinity) - end);
    const soon = left.filter((days) => days <= 14).length;
    expect(out.length).toBeGreaterThanOrEqual(2);
    expect(out.length).toBeLessThanOrEqual(8);
    expect(soon).toBeGreaterThanOrEqual(20);
    expect(soon).toBeLessThanOrEqual(30);
    expect(left.filter((days) => days > 365).length).toBeGreaterThan(100);
    expect(left.filter((days) => days > 60 && days <= 365).length).toBeGreaterThan(500);
  });

  // As text: comparing thousands of objects one by one takes longer than making them.
  it("is the same again for the same seed and moment", () => {
    const again = buildScenario(1, NOW);
    for (const part of ["packs", "readings", "rounds", "stockMoves"] as const) {
      expect(JSON.stringify(again[part]) === JSON.stringify(s[part]), part).toBe(true);
    }
  }, 240_000);
});

it("shows its technician at work on a weekend too", () => {
  // 5 December 2026 is a Saturday.
  const weekend = buildScenario(1, new Date("2026-12-05T08:00:00Z"));
  const today = Math.floor(worldTime(new Date("2026-12-05T08:00:00Z")));
  const shown = weekend.rounds.filter((r) => r.state === "published" && r.day === today);
  expect(shown.map((round) => round.technicianKey)).toEqual(["technician-1"]);
  expect(shown[0]!.stops.length).toBeGreaterThan(2);
}, 240_000);

describe("the history", () => {
  it("never has two packs in one asset, and every voltage lies in its pack's time", () => {
    const byAsset = new Map<string, (typeof s.packs)[number][]>();
    for (const p of s.packs) byAsset.set(p.assetTag, [...(byAsset.get(p.assetTag) ?? []), p]);
    for (const packs of byAsset.values()) {
      packs.forEach((p, i) => {
        if (i > 0)
          expect(packs[i - 1]!.removedAt!.getTime()).toBeLessThanOrEqual(p.installedAt.getTime());
        if (p.removedAt) expect(p.removedAt.getTime()).toBeGreaterThan(p.installedAt.getTime());
        if (p.stoppedAt) expect(p.stoppedAt.getTime()).toBeGreaterThan(p.installedAt.getTime());
      });
    }
    const packs = new Map(s.packs.map((p) => [p.key, p]));
    for (const r of s.readings) {
      const pack = packs.get(r.packKey)!;
      expect(r.at.getTime()).toBeGreaterThanOrEqual(pack.installedAt.getTime());
      expect(r.at.getTime()).toBeLessThanOrEqual(pack.removedAt?.getTime() ?? NOW.getTime());
    }
  });

  it("mixes what came out dead with what came out early", () => {
    const out = s.packs.filter((p) => p.reasonOut !== null);
    const share = (reason: string): number =>
      out.filter((p) => p.reasonOut === reason).length / out.length;
    expect(share("found_stopped")).toBeGreaterThan(0.3);
    expect(share("early")).toBeGreaterThan(0.2);
    expect(out.filter((p) => p.reasonOut === "found_stopped").every((p) => p.stoppedAt)).toBe(true);
    expect(out.filter((p) => p.reasonOut === "early").every((p) => !p.stoppedAt)).toBe(true);
  });

  it("keeps its books: what came in equals what was fitted and what still lies there", () => {
    const received = sum(s.lots.map((l) => l.cellsReceived));
    const fitted = sum(s.packs.map((p) => p.series * p.parallel));
    expect(received).toBe(fitted + sum(s.stockCounts.map((c) => c.cells)));
    const held = new Map<string, number>();
    for (const m of s.stockMoves) {
      if (m.from)
        held.set(`${m.from} ${m.lotCode}`, (held.get(`${m.from} ${m.lotCode}`) ?? 0) - m.cells);
      if (m.to) held.set(`${m.to} ${m.lotCode}`, (held.get(`${m.to} ${m.lotCode}`) ?? 0) + m.cells);
    }
    const counted = new Map(s.stockCounts.map((c) => [`${c.place} ${c.lotCode}`, c.cells]));
    for (const [key, cells] of held) expect(cells, key).toBe(counted.get(key) ?? 0);
  });

  it("sends nobody out twice on a day, on leave, without the ticket or beyond the shift", () => {
    const days = s.rounds.map((r) => `${r.technicianKey} ${r.day}`);
    expect(new Set(days).size).toBe(days.length);
    const sites = new Map(s.sites.map((site) => [site.code, site]));
    const crew = new Map(s.technicians.map((t) => [t.key, t]));
    for (const r of s.rounds) {
      expect(isAway(s.absences, r.technicianKey, r.day)).toBe(false);
      for (const stop of r.stops) {
        for (const ticket of sites.get(stop.siteCode)!.tickets) {
          expect(crew.get(r.technicianKey)!.tickets).toContain(ticket);
        }
      }
      expect(r.endsAt.getTime() - r.startsAt.getTime()).toBeLessThan(9.5 * 3_600_000);
    }
  });

  it("shows the bad lot and the firmware in the lives of the packs", () => {
    const life = (p: (typeof s.packs)[number]): number =>
      ((p.stoppedAt ?? p.removedAt ?? NOW).getTime() - p.installedAt.getTime()) / 86_400_000;
    const dead = s.packs.filter(
      (p) => p.assetTag.startsWith("SP1") && p.designation === "LR6" && p.stoppedAt,
    );
    const byLot = [...new Set(dead.map((p) => p.lotCode))]
      .map((code) => dead.filter((p) => p.lotCode === code).map(life))
      .filter((lives) => lives.length >= 8)
      .map(median)
      .sort((a, b) => a - b);
    expect(byLot[0]! / median(byLot)).toBeLessThan(0.85);
    expect(s.events.filter((e) => e.kind === "firmware_changed").length).toBeGreaterThan(80);
  });
});

describe("invented throughout", () => {
  // RFC 2606 keeps .example; Ofcom keeps 01632 960000 to 960999 for drama.
  it("uses addresses and numbers that are kept for invention", () => {
    for (const p of s.people) expect(p.email).toMatch(/@quillmere\.example$/);
    for (const { contact } of s.sites) {
      if (!contact) continue;
      expect(contact.email).toMatch(/\.example$/);
      expect(contact.phone).toMatch(/^01632 960\d{3}$/);
    }
    expect(new Set(s.people.flatMap((p) => p.roles)).size).toBe(4);
  });

  it("puts every site near a road of the district", () => {
    for (const site of s.sites) {
      const nearest = Math.min(
        ...s.district.roads.roads.map((r) => distanceToLine(site.at, r.line)),
      );
      expect(nearest, site.name).toBeLessThan(1_000);
    }
    expect(new Set(s.sites.map((site) => site.name)).size).toBe(s.sites.length);
  });
});

function sum(numbers: readonly number[]): number {
  return numbers.reduce((total, n) => total + n, 0);
}

function median(numbers: readonly number[]): number {
  return [...numbers].sort((a, b) => a - b)[numbers.length >> 1] ?? NaN;
}
