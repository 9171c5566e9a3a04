import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { requireActor } from "@/lib/server/session";
import { readCalendarStart } from "@/lib/usecases/read-calendar";
import { CalendarScreen } from "./_parts/calendar-screen";

export const metadata: Metadata = { title: "Calendar" };

export default async function CalendarPage(props: {
  searchParams: Promise<{ view?: string; date?: string }>;
}) {
  const { view = "week", date } = await props.searchParams;
  const start = await readCalendarStart(deps(), await requireActor(), { day: date ?? null });
  return (
    <>
      <h1 className="sr-only">Calendar</h1>
      <CalendarScreen initial={start.view} day={start.day} view={view} span={start.span} />
    </>
  );
}
