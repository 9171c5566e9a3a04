/**
 * Moving visits on the calendar as a dispatcher does: with the mouse to another day and to
 * another person, with the keyboard alone, a drop that is refused, and undone. Where a visit may
 * go is asked of the API beforehand; what came of a drop is read from the database.
 */
import type { Browser, Locator, Page } from "playwright-core";
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { connect } from "@/db/client";
import type { CalendarEvent } from "@/lib/present/calendar-event";
import type { CalendarView } from "@/lib/usecases/read-calendar";
import type { PlaceOption } from "@/lib/usecases/price-plan-options";
import { openBrowser, openPage, productUrl, signIn } from "../support/browser";

const db = connect(process.env.DATABASE_URL ?? "", { max: 2 });
let browser: Browser;
let watched: Awaited<ReturnType<typeof openPage>>;
let page: Page;
let choice: Choice;

/** A published visit with every place it could go to. */
interface Choice {
  readonly visit: CalendarEvent;
  readonly options: readonly PlaceOption[];
}

beforeAll(async () => {
  browser = await openBrowser();
  watched = await openPage(browser, "desktop");
  page = watched.page;
  await signIn(page, "dispatcher");
});
beforeEach(async () => {
  choice = await chooseVisit();
});
/** Nothing stays: the drafts that moves made are thrown away. */
afterEach(async () => {
  for (const draft of (await readCalendar()).drafts) {
    await watched.context.request.delete(productUrl(`/api/v1/plans/${draft.id}`));
  }
});
afterAll(async () => {
  await browser.close();
  await db.destroy();
});

async function readJson<T>(path: string): Promise<T> {
  return (await (await watched.context.request.get(productUrl(path))).json()) as T;
}

async function readCalendar(): Promise<CalendarView> {
  const day = (days: number) => new Date(Date.now() + days * 86_400_000).toISOString().slice(0, 10);
  return readJson(`/api/v1/calendar?from=${day(-7)}&to=${day(21)}`);
}

/** The movable visit that could go to most places: on another day and to another person. */
async function chooseVisit(): Promise<Choice> {
  const { events } = await readCalendar();
  const movable = events.filter((event) => event.movable && event.state === "published");
  const choices: Choice[] = [];
  for (const visit of movable.slice(0, 12)) {
    const path = `/api/v1/plans/${visit.planId}/options?site=${visit.siteId}`;
    const { options } = await readJson<{ options: PlaceOption[] }>(path);
    choices.push({ visit, options });
  }
  const free = ({ options }: Choice) => options.filter((o) => o.allowed && !o.here).length;
  const best = choices.sort((a, b) => free(b) - free(a))[0];
  if (!best) throw new Error("the scenario holds no visit that could be moved");
  return best;
}

function optionOf(holds: (option: PlaceOption) => boolean): PlaceOption {
  const found = choice.options.find((option) => !option.here && holds(option));
  if (!found) throw new Error(`no such place for ${choice.visit.title}`);
  return found;
}

/** The draft's round that holds the visit's site now, or null. */
async function proposedPlace(siteId: string) {
  const row = await db
    .selectFrom("stop")
    .innerJoin("round", "round.id", "stop.roundId")
    .innerJoin("plan", "plan.id", "round.planId")
    .select(["round.technicianId", "round.day"])
    .where("plan.state", "=", "draft")
    .where("stop.siteId", "=", siteId)
    .executeTakeFirst();
  return row ?? null;
}

async function openWeek(): Promise<void> {
  await page.goto(productUrl(`/calendar?view=week&date=${choice.visit.day}`));
  await page.locator(".week-by-technician").waitFor();
}

const lineOf = (technician: string) =>
  page.locator(".week-line").filter({ has: page.locator(".week-name", { hasText: technician }) });

function visitIn(place: Locator): Locator {
  return place.locator(".rbc-event", { hasText: choice.visit.title }).first();
}

async function middleOf(place: Locator) {
  await place.scrollIntoViewIfNeeded();
  return centreOf(place);
}

async function centreOf(place: Locator) {
  const box = await place.boundingBox();
  if (!box) throw new Error("it is not on the page");
  return { x: box.x + box.width / 2, y: box.y + box.height / 2 };
}

/** Real moves of the mouse, in steps, as a hand makes them. */
async function drag(what: Locator, to: Locator): Promise<void> {
  await middleOf(to);
  const from = await middleOf(what);
  const target = await centreOf(to);
  // A column of hours is dropped on at the hour at which the visit stands.
  if (await to.evaluate((node) => node.classList.contains("rbc-day-slot"))) target.y = from.y;
  await page.mouse.move(from.x, from.y);
  await page.mouse.down();
  await page.mouse.move(from.x + 8, from.y + 4, { steps: 3 });
  await page.mouse.move(target.x, target.y, { steps: 12 });
  // The calendar follows the mouse frame by frame: it must have seen the place before the drop.
  await page.waitForTimeout(200);
  await page.mouse.move(target.x + 1, target.y);
  await page.waitForTimeout(100);
  await page.mouse.up();
}

async function dayCell(technician: string, day: string): Promise<Locator> {
  const days = await page.locator(".week-day").allInnerTexts();
  const wanted = String(Number(day.slice(8)));
  const place = days.findIndex((words) => words.split(" ")[1] === wanted);
  return lineOf(technician).locator(".rbc-day-bg").nth(place);
}

const moved = () => page.getByText(`${choice.visit.title} moved in a draft.`);

describe("a visit dragged in the week", () => {
  it("goes to another day, as a proposal, and comes back by Undo", async () => {
    const { visit } = choice;
    const to = optionOf((o) => o.allowed && o.day !== visit.day);
    await openWeek();
    await drag(visitIn(lineOf(visit.technician)), await dayCell(to.technician, to.day));
    await moved().waitFor();
    const place = await proposedPlace(visit.siteId);
    expect(place).toEqual({ technicianId: to.technicianId, day: to.day });
    await lineOf(to.technician).locator(".visit-proposed", { hasText: visit.title }).waitFor();
    await page.getByText("is a draft: its visits (dashed) are proposed").waitFor();
    await page.getByRole("button", { name: "Undo" }).click();
    await visitIn(lineOf(visit.technician)).waitFor();
    await expect
      .poll(() => proposedPlace(visit.siteId))
      .toEqual({ technicianId: visit.technicianId, day: visit.day });
  });

  it("goes to another person on the same day", async () => {
    const { visit } = choice;
    const to = optionOf((o) => o.allowed && o.day === visit.day);
    await openWeek();
    await drag(visitIn(lineOf(visit.technician)), await dayCell(to.technician, to.day));
    await moved().waitFor();
    const place = await proposedPlace(visit.siteId);
    expect(place).toEqual({ technicianId: to.technicianId, day: visit.day });
  });

  it("stays where a drop is refused, and the reason is said", async () => {
    const { visit } = choice;
    const days = weekDays();
    const to = optionOf((o) => !o.allowed && days.includes(o.day));
    await openWeek();
    await drag(visitIn(lineOf(visit.technician)), await dayCell(to.technician, to.day));
    const notice = page.getByText(`${visit.title} stays where it is.`);
    await notice.waitFor();
    expect(await notice.innerText()).toMatch(/It cannot go there: .{5,}/);
    await visitIn(lineOf(visit.technician)).waitFor();
    const place = await proposedPlace(visit.siteId);
    expect(place ?? visit).toMatchObject({ technicianId: visit.technicianId, day: visit.day });
  });
});

/** Monday to Friday of the visit's week: the columns that are always shown. */
function weekDays(): string[] {
  const noon = new Date(`${choice.visit.day}T12:00:00Z`);
  const monday = noon.getTime() - ((noon.getUTCDay() + 6) % 7) * 86_400_000;
  return [0, 1, 2, 3, 4].map((n) => new Date(monday + n * 86_400_000).toISOString().slice(0, 10));
}

describe("a visit dragged between technicians side by side", () => {
  it("goes to the other person's column", async () => {
    const { visit } = choice;
    const to = optionOf((o) => o.allowed && o.day === visit.day);
    await page.goto(productUrl(`/calendar?view=day&date=${visit.day}`));
    // The days, which the library repeats under each name, are not shown.
    const heads = page.locator(".rbc-time-header .rbc-row-resource .rbc-header");
    await heads.first().waitFor();
    const column = (await heads.allInnerTexts()).findIndex((name) => name === to.technician);
    const slots = page.locator(".rbc-day-slot");
    await drag(visitIn(page.locator(".rbc-time-content")), slots.nth(column));
    await moved().waitFor();
    const place = await proposedPlace(visit.siteId);
    expect(place).toEqual({ technicianId: to.technicianId, day: visit.day });
  });
});

describe("without a mouse", () => {
  it("a visit is opened, its places are read out with prices, and it is moved", async () => {
    const { visit } = choice;
    const to = optionOf((o) => o.allowed);
    await openWeek();
    await visitIn(lineOf(visit.technician)).getByRole("button").focus();
    await page.keyboard.press("Enter");
    const dialog = page.getByRole("dialog", { name: visit.title });
    const place = dialog.getByRole("radio", { name: `${to.dayLabel}, ${to.technician}` });
    await place.focus();
    await page.keyboard.press("Space");
    await dialog.getByRole("button", { name: "Move it" }).focus();
    await page.keyboard.press("Enter");
    await moved().waitFor();
    expect(await proposedPlace(visit.siteId)).toEqual({
      technicianId: to.technicianId,
      day: to.day,
    });
  });

  it("a visit opens with Enter where technicians stand side by side, too", async () => {
    const { visit } = choice;
    await page.goto(productUrl(`/calendar?view=day&date=${visit.day}`));
    await visitIn(page.locator(".rbc-time-content")).focus();
    await page.keyboard.press("Enter");
    await page.getByRole("dialog", { name: visit.title }).waitFor();
    await page.keyboard.press("Escape");
    expect(watched.errors.filter((error) => !error.includes("409"))).toEqual([]);
  });
});
