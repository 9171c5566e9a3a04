import type { RoundSheet as Sheet } from "@/lib/usecases/read-round-sheet";

/** One round on one A4 sheet: what to load, then the stops in order. */
export function RoundSheet({ sheet }: { sheet: Sheet }) {
  const { round, gear } = sheet;
  // Long rounds get a smaller hand, so that the sheet stays one page.
  const size = sheet.stops.length > 11 ? "text-xs" : "text-sm";
  return (
    <article
      className={`mx-auto max-w-[190mm] bg-sheet p-4 text-ink print:max-w-none print:p-0 ${size}`}
    >
      <header className="flex flex-wrap items-baseline justify-between gap-x-4 border-b-2 border-ink pb-1">
        <h1 className="text-xl">{round.title}</h1>
        <span>{[sheet.van, `from ${sheet.depot}`, round.summary].filter(Boolean).join(" · ")}</span>
      </header>
      <section className="grid grid-cols-[minmax(0,1.4fr)_minmax(0,1fr)] gap-x-6 border-b border-ink py-2">
        <div>
          <h2 className="caps">Cells to load</h2>
          <ul>
            {sheet.load.map((line) => (
              <li key={line.lotId}>
                <b>
                  {line.cells} × {line.designation}
                </b>{" "}
                lot {line.lotCode}
                {line.madeOn && `, made ${line.madeOn}`}
                <span className="text-soft"> for {line.forTags.join(", ")}</span>
              </li>
            ))}
            {sheet.shortages.map((short) => (
              <li key={short.cellTypeId} className="text-brick-ink">
                <b>
                  Short: {short.cells} × {short.designation}
                </b>{" "}
                for {short.forTags.join(", ")}
              </li>
            ))}
            {sheet.load.length + sheet.shortages.length === 0 && <li>No cells.</li>}
          </ul>
        </div>
        <div>
          <h2 className="caps">Keys and gear</h2>
          <p>
            {[...gear.keys.map((key) => `key ${key}`), ...gear.gear].join(" · ") ||
              "nothing special"}
          </p>
        </div>
      </section>
      <StopTable sheet={sheet} />
      <footer className="mt-2 border-t border-ink pt-1.5">
        Replace all cells of a pack together; do not mix types, makes or ages; mind the polarity.
        Tape the terminals of what comes out
        {sheet.lithium && "; never open, short or heat lithium cells"}. Local rules, the maker’s
        data and licensed practice come first. {sheet.organisation}.
      </footer>
    </article>
  );
}

function StopTable({ sheet }: { sheet: Sheet }) {
  return (
    <table className="w-full border-collapse">
      <caption className="sr-only">Stops in order</caption>
      <thead>
        <tr className="caps border-b border-ink text-left">
          <th scope="col" className="w-6 py-1">
            No.
          </th>
          <th scope="col" className="w-12">
            Time
          </th>
          <th scope="col">Site and way in</th>
          <th scope="col" className="w-[48%]">
            Work
          </th>
        </tr>
      </thead>
      <tbody>
        {sheet.stops.map((stop) => (
          <tr key={stop.stopId} className="break-inside-avoid border-b border-hair align-top">
            <td className="py-1 font-semibold">{stop.position}</td>
            <td className="font-mono">{stop.time}</td>
            <td className="pr-3">
              <b>{stop.siteName}</b>
              {stop.access && <div>{stop.access}</div>}
              {stop.hazards.length > 0 && (
                <div>Mind: {stop.hazards.map((h) => h.replaceAll("_", " ")).join(", ")}.</div>
              )}
              {stop.contact && <div className="text-soft">{stop.contact}</div>}
            </td>
            <td>
              {stop.tasks.map((task) => (
                <div key={task.assetId} className="flex gap-2">
                  <span aria-hidden="true" className="mt-0.5 size-3 shrink-0 border border-ink" />
                  <span>
                    <span className="font-mono">{task.tag}</span> {task.name}: {task.work}{" "}
                    <span className="text-soft">({task.disc.label} left)</span>
                  </span>
                </div>
              ))}
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
