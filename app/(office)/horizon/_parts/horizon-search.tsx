import type { HorizonParams } from "./horizon-params";

/** Search by tag, name or site; a plain form, so it works before scripts have loaded. */
export function HorizonSearch({ params, value }: { params: HorizonParams; value: string }) {
  const kept = Object.entries(params).filter(([key, v]) => v && key !== "q" && key !== "page");
  return (
    <form action="/horizon" role="search" className="flex">
      {kept.map(([key, v]) => (
        <input key={key} type="hidden" name={key} value={v} />
      ))}
      <input
        type="search"
        name="q"
        defaultValue={value}
        placeholder="Tag, name or site"
        aria-label="Search by tag, name or site"
        className="min-h-7 w-40 rounded-full border border-rule bg-sheet px-3 text-sm text-ink placeholder:text-soft hover:border-ink"
      />
    </form>
  );
}
