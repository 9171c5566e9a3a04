import { hrefWith } from "@/lib/present/paging";

export interface SearchBoxProps {
  path: string;
  /** What is searched: "Tag, name or site". */
  label: string;
  params: Readonly<Record<string, string | undefined>>;
}

/** A search whose words live in the address under `q`; a plain form, so it works without script. */
export function SearchBox({ path, label, params }: SearchBoxProps) {
  const kept = Object.entries(params).filter(([key, v]) => v && key !== "q" && key !== "page");
  return (
    <form action={path} role="search" className="flex items-center gap-1.5">
      {kept.map(([key, v]) => (
        <input key={key} type="hidden" name={key} value={v} />
      ))}
      <input
        key={params.q ?? ""}
        type="search"
        name="q"
        defaultValue={params.q ?? ""}
        placeholder={label}
        aria-label={`Search: ${label}`}
        className="min-h-7 w-44 rounded-full border border-soft bg-sheet px-3 text-sm text-ink placeholder:text-soft hover:border-ink"
      />
      {params.q && (
        <a href={hrefWith(path, params, { q: null })} className="textlink text-sm">
          clear
        </a>
      )}
    </form>
  );
}
