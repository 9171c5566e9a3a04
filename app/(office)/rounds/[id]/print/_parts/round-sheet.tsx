import type { RoundSheet as Sheet } from "@/lib/usecases/read-round-sheet";

/** Lines that a sheet holds in the ordinary and in the smaller hand; more take the smallest. */
const ORDINARY = 30;
const SMALLER = 44;

/** How many lines the sheet takes at about: its load in two columns, and its stops. */
function linesOf({ load, shortages, stops }: Sheet): number {
  const work = stops.map((stop) =>
    Math.max(stop.access || stop.contact ? 2 : 1, stop.tasks.length),
  );
  return (load.length + shortages.length) / 2 + work.reduce((sum, lines) => sum + lines, 0);
}

/** One round on one A4 sheet: what to load, then the stops in order. */
export function RoundSheet({ sheet }: { sheet: Sheet }) {
  const { round } = sheet;
  const lines = linesOf(sheet);
  const hand =
    lines <= ORDINARY ? "text-sm" : lines <= SMALLER ? "text-xs" : "text-2xs leading-[0.8125rem]";
  return (
    <article
      className={`mx-auto max-w-[190mm] bg-sheet p-4 text-ink print:max-w-none print:p-0 ${hand}`}
    >
      <header className="flex flex-wrap items-baseline justify-between gap-x-4 border-b-2 border-ink pb-0.5">
        <h1 className="text-lg">{round.title}</h1>
        <span>{[sheet.van, `from ${sheet.depot}`, round.summary].filter(Boolean).join(" · ")}</span>
      </header>
      <Load sheet={sheet} />
      <StopTable sheet={sheet} />
      <footer className="mt-1 border-t border-ink pt-1">
        Replace all cells of a pack together; do not mix types, makes or ages; mind the polarity.
        Tape the terminals of what comes out
        {sheet.lithium && "; never open, short or heat lithium cells"}. Local rules, the maker’s
        data and licensed practice come first. {sheet.organisation}.
      </footer>
    </article>
  );
}

function Load({ sheet }: { sheet: Sheet }) {
  const { load, shortages, gear } = sheet;
  const carried = [...gear.keys.map((key) => `key ${key}`), ...gear.gear];
  return (
    <section className="border-b border-ink py-1">
      <h2 className="caps">To load</h2>
      <ul className="columns-2 gap-x-6">
        {load.map((line) => (
          <li key={line.lotId}>
            <b>
              {line.cells} × {line.designation}
            </b>{" "}
            {line.lotCode}
            {line.madeOn && `, made ${line.madeOn}`}
            <span className="text-soft"> for {line.forTags.join(", ")}</span>
          </li>
        ))}
        {shortages.map((short) => (
          <li key={short.cellTypeId} className="text-brick-ink">
            <b>
              Short: {short.cells} × {short.designation}
            </b>{" "}
            for {short.forTags.join(", ")}
          </li>
        ))}
        {load.length + shortages.length === 0 && <li>No cells.</li>}
      </ul>
      {carried.length > 0 && <p className="font-semibold">{carried.join(" · ")}</p>}
    </section>
  );
}

function StopTable({ sheet }: { sheet: Sheet }) {
  return (
    <table className="w-full border-collapse">
      <caption className="sr-only">Stops in order</caption>
      <thead>
        <tr className="caps border-b border-ink text-left">
          <th scope="col" className="w-6">
            No.
          </th>
          <th scope="col" className="w-11">
            Time
          </th>
          <th scope="col">Site and way in</th>
          <th scope="col" className="w-[46%]">
            Work
          </th>
        </tr>
      </thead>
      <tbody>
        {sheet.stops.map((stop) => (
          <tr key={stop.stopId} className="break-inside-avoid border-b border-hair align-top">
            <td className="font-semibold">{stop.position}</td>
            <td className="font-mono">{stop.time}</td>
            <td className="pr-3">
              <b>{stop.siteName}.</b> {stop.access}
              {stop.hazards.length > 0 &&
                ` Mind: ${stop.hazards.map((h) => h.replaceAll("_", " ")).join(", ")}.`}
              {stop.contact && <span className="text-soft"> {stop.contact}</span>}
            </td>
            <td>
              {stop.tasks.map((task) => (
                <Task key={task.assetId} task={task} siteName={stop.siteName} />
              ))}
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

type StopTask = Sheet["stops"][number]["tasks"][number];

/** A box to tick, the tag, the asset without its site's name, which stands beside it, the work. */
function Task({ task, siteName }: { task: StopTask; siteName: string }) {
  const ending = `, ${siteName}`;
  const name = task.name.endsWith(ending) ? task.name.slice(0, -ending.length) : task.name;
  return (
    <div className="flex gap-1.5">
      <span aria-hidden="true" className="mt-0.5 size-2.5 shrink-0 border border-ink" />
      <span>
        <span className="font-mono">{task.tag}</span> {name}: {task.work}{" "}
        <span className="text-soft">({task.disc.label})</span>
      </span>
    </div>
  );
}
