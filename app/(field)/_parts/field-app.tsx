"use client";

import { usePathname, useSearchParams } from "next/navigation";
import { lazy, type MouseEvent, Suspense, useEffect } from "react";
import { FieldBar } from "@/components/ui/field-bar";
import { FieldPage } from "@/components/ui/field-page";
import { Skeleton } from "@/components/ui/states";
import { loadTraffic, runFieldStore } from "@/lib/offline/browser-store";
import { keepShell } from "@/lib/offline/shell";
import { go, staysHere } from "./go";
import { showNight } from "./night";
import { loadTodayParts, TodayScreen } from "./today-screen";
import { useField } from "./use-field";

// Today comes first and alone; the rest follows at once, and is on the phone before the signal goes.
const load = {
  stop: () => import("./stop-screen"),
  log: () => import("./log-screen"),
  swap: () => import("./swap-screen"),
  cannot: () => import("./cannot-screen"),
  find: () => import("./find-screen"),
  outbox: () => import("./outbox-screen"),
  noDay: () => import("./no-day"),
};
const StopScreen = lazy(async () => ({ default: (await load.stop()).StopScreen }));
const LogScreen = lazy(async () => ({ default: (await load.log()).LogScreen }));
const SwapScreen = lazy(async () => ({ default: (await load.swap()).SwapScreen }));
const CannotScreen = lazy(async () => ({ default: (await load.cannot()).CannotScreen }));
const FindScreen = lazy(async () => ({ default: (await load.find()).FindScreen }));
const OutboxScreen = lazy(async () => ({ default: (await load.outbox()).OutboxScreen }));

const NoDay = lazy(async () => ({ default: (await load.noDay()).NoDay }));

const loadEveryPart = () =>
  Promise.all([...Object.values(load).map((part) => part()), loadTodayParts(), loadTraffic()]);

/** Where the browser reads no codes itself; without it typing still works. */
const fetchDecoder = () =>
  import("@/lib/offline/scan").then((scan) => scan.prepareScanning()).catch(() => undefined);

/** All phone pages: which one is shown follows the address. */
export function FieldApp() {
  useEffect(runFieldStore, []);
  useEffect(showNight, []);
  useEffect(() => {
    // Every part must be on the phone before the signal goes, not only the one looked at.
    void loadEveryPart()
      .then(fetchDecoder)
      .then(keepShell, () => undefined);
  }, []);
  return (
    <div onClickCapture={answerHere}>
      <Suspense fallback={<Opening />}>
        <Screen />
      </Suspense>
    </div>
  );
}

function Screen() {
  const path = usePathname();
  const query = useSearchParams();
  const field = useField();
  if (field.phase === "opening") return <Opening />;
  if (path === "/outbox") return <OutboxScreen field={field} />;
  const { day } = field;
  if (!day) return <NoDay field={field} />;
  const given = { field, day, query };
  switch (path) {
    case "/stop":
      return <StopScreen {...given} />;
    case "/log":
      return <LogScreen key={query.toString()} {...given} />;
    case "/swap":
      return <SwapScreen key={query.toString()} {...given} />;
    case "/cannot":
      return <CannotScreen {...given} />;
    case "/find":
      return <FindScreen {...given} />;
    default:
      return <TodayScreen {...given} />;
  }
}

function Opening() {
  return (
    <>
      <FieldBar title="Wanewright" heading />
      <FieldPage>
        <Skeleton label="Opening what this phone keeps" shape="lines" rows={8} />
      </FieldPage>
    </>
  );
}

/** Links between phone pages never ask the server: they work the same without signal. */
function answerHere(event: MouseEvent): void {
  const link = event.target instanceof Element ? event.target.closest("a") : null;
  if (!link || !staysHere(event.nativeEvent, link)) return;
  event.preventDefault();
  go(link.href);
}
