import Link from "next/link";

export interface TabItem {
  label: string;
  href: string;
  current?: boolean;
  count?: number | string;
}

/** Parts of one screen, each with its own address. */
export function Tabs({ label, items }: { label: string; items: readonly TabItem[] }) {
  return (
    <nav
      aria-label={label}
      className="mb-4 flex overflow-x-auto border-b max-sm:flex-wrap border-rule"
    >
      {items.map((item) => (
        <Link
          key={item.href}
          href={item.href}
          prefetch={false}
          aria-current={item.current ? "page" : undefined}
          className="-mb-px flex min-h-9 items-center gap-1.5 border-y-[3px] border-transparent px-3 font-medium whitespace-nowrap text-soft hover:text-ink aria-[current=page]:border-b-spruce aria-[current=page]:text-ink"
        >
          {item.label}
          {item.count !== undefined && <span className="font-cond font-normal">{item.count}</span>}
        </Link>
      ))}
    </nav>
  );
}
