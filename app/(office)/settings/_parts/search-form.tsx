import { Button } from "@/components/ui/button";
import { controlClass } from "@/components/ui/field";

export interface SearchFormProps {
  path: string;
  /** What is searched: "name or mail address". */
  label: string;
  search: string;
  /** Filters that stay while searching. */
  keep: Readonly<Record<string, string | null>>;
}

/** A search whose words live in the address; works without script. */
export function SearchForm({ path, label, search, keep }: SearchFormProps) {
  return (
    <form action={path} role="search" className="flex items-center gap-2">
      {Object.entries(keep).map(([name, value]) =>
        value ? <input key={name} type="hidden" name={name} value={value} /> : null,
      )}
      <input
        key={search}
        type="search"
        name="search"
        aria-label={`Search ${label}`}
        placeholder={label}
        defaultValue={search}
        className={`${controlClass} w-56`}
      />
      <Button type="submit">Search</Button>
    </form>
  );
}
