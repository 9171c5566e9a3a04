import type { DigestProps, LinkMailProps, RoundMailProps, VisitMailProps } from "./mail-props";

const house = {
  organisation: "Quillmere Drainage Board",
  locale: "en-GB",
  timeZone: "Europe/London",
  currency: "GBP",
};

export const previewLink: LinkMailProps = {
  ...house,
  name: "Ada Fenwick",
  url: "https://wanewright.example/welcome?token=preview",
  expiresAt: "2026-12-03T09:00:00Z",
};

export const previewRound: RoundMailProps = {
  ...house,
  technicianName: "Tom Reed",
  day: "2026-12-09",
  url: "https://wanewright.example/today?day=2026-12-09",
  depotName: "North bank depot",
  startsAt: "2026-12-09T08:00:00Z",
  endsAt: "2026-12-09T14:50:00Z",
  distanceM: 61_000,
  driveS: 6_900,
  workS: 17_700,
  stops: [
    {
      position: 1,
      arrivesAt: "2026-12-09T08:35:00Z",
      departsAt: "2026-12-09T08:55:00Z",
      siteName: "Sluice 9",
      latitude: 53.9,
      longitude: 1.9,
      access: "Gate on the east track; key 14.",
      hazards: ["water", "lone_working"],
      tasks: [
        { kind: "swap", tag: "QF-0417", assetName: "Level gauge", designation: "LR20", cells: 2 },
        { kind: "read", tag: "QF-0418", assetName: "Gate position", designation: null, cells: 0 },
      ],
    },
  ],
  load: [{ designation: "LR20", cells: 2 }],
  keys: ["14"],
  changes: [],
  calendar: { uid: "round-1@wanewright.example", sequence: 0, stamp: "2026-12-01T09:00:00Z" },
};

export const previewDigest: DigestProps = {
  ...house,
  name: "Ruth Holm",
  url: "https://wanewright.example/horizon",
  day: "2026-12-01",
  horizonDays: 14,
  outNow: [
    {
      tag: "QF-0032",
      assetName: "Door contact east",
      siteName: "Pump house 3",
      left: "out",
      p05: "2026-11-19",
      p50: "2026-11-23",
      p95: "2026-11-28",
      visitOn: null,
    },
  ],
  due: [
    {
      tag: "QF-0981",
      assetName: "Piezometer P-14",
      siteName: "Long drove",
      left: "9 %",
      p05: "2026-12-05",
      p50: "2026-12-15",
      p95: "2027-01-01",
      visitOn: "2026-12-03",
    },
  ],
  more: 21,
  expected: { p05: 19, mean: 23, p95: 28 },
  notBooked: 1,
};

export const previewVisit: VisitMailProps = {
  ...house,
  contactName: "Mr Alder",
  siteName: "Long drove",
  day: "2026-12-03",
  around: "09:20",
  minutes: 35,
  technicianName: "Ada Fenwick",
};
