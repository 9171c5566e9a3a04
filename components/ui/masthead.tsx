import Link from "next/link";
import type { ReactNode } from "react";
import { BrandDisc } from "@/components/ui/brand-disc";

export type OfficeScreen =
  "Horizon" | "Rounds" | "Calendar" | "Map" | "Fleet" | "Stores" | "Record" | "Settings";

const screens: readonly { name: OfficeScreen; href: string }[] = [
  { name: "Horizon", href: "/horizon" },
  { name: "Rounds", href: "/rounds" },
  { name: "Calendar", href: "/calendar" },
  { name: "Map", href: "/map" },
  { name: "Fleet", href: "/fleet" },
  { name: "Stores", href: "/stores" },
  { name: "Record", href: "/record" },
  { name: "Settings", href: "/settings" },
];

export interface MastheadProps {
  current?: OfficeScreen;
  /** Today with its week, such as "Tue 1 Dec 2026 · week 49". */
  today: string;
  /** The crew the pages are narrowed to. */
  crew?: { label: string; href: string };
  person: { name: string; role: string };
  /** Screens this person may open; all when left out. */
  allowed?: readonly OfficeScreen[];
  /** The sign-out form and other lines of the person's menu. */
  children?: ReactNode;
}

/** The head of every office page. */
export function Masthead({ current, today, crew, person, allowed, children }: MastheadProps) {
  return (
    <header className="border-b-2 border-ink bg-sheet">
      <SkipLink />
      <div className="grid grid-cols-[auto_minmax(0,1fr)] items-stretch px-4 lg:px-7 min-[75rem]:grid-cols-[auto_minmax(0,1fr)_auto]">
        <Link
          href="/horizon"
          className="flex items-center gap-2.5 py-2.5 pr-6 font-serif text-xl font-semibold tracking-tight min-[75rem]:border-r min-[75rem]:border-rule"
        >
          <BrandDisc />
          Wanewright
        </Link>
        <Screens current={current} allowed={allowed} />
        <div className="flex items-center justify-end gap-3.5 text-soft">
          <span className="whitespace-nowrap max-md:hidden">{today}</span>
          {crew && (
            <Link
              href={crew.href}
              className="rounded-full border border-rule px-3 py-1 text-sm whitespace-nowrap hover:border-ink"
            >
              {crew.label}
            </Link>
          )}
          <PersonMenu person={person}>{children}</PersonMenu>
        </div>
      </div>
    </header>
  );
}

function SkipLink() {
  return (
    <a
      href="#main"
      className="absolute -top-20 left-2 z-10 rounded bg-ink px-3 py-2 text-paper focus:top-2"
    >
      Skip to the page
    </a>
  );
}

function Screens({ current, allowed }: Pick<MastheadProps, "current" | "allowed">) {
  const shown = screens.filter((screen) => !allowed || allowed.includes(screen.name));
  return (
    <nav
      aria-label="Office"
      className="flex overflow-x-auto max-sm:flex-wrap max-[75rem]:order-3 max-[75rem]:col-span-2 max-[75rem]:-mx-3 max-[75rem]:border-t max-[75rem]:border-hair min-[75rem]:pl-3"
    >
      {shown.map((screen) => (
        <Link
          key={screen.name}
          href={screen.href}
          aria-current={screen.name === current ? "page" : undefined}
          className="flex min-h-11 items-center border-y-4 border-transparent px-3 font-medium text-soft hover:text-ink aria-[current=page]:border-b-spruce aria-[current=page]:text-ink"
        >
          {screen.name}
        </Link>
      ))}
    </nav>
  );
}

/** Native popover: closes on Escape and on a press elsewhere, without script. */
function PersonMenu({ person, children }: Pick<MastheadProps, "person" | "children">) {
  return (
    <>
      <button
        type="button"
        popoverTarget="person-menu"
        className="min-h-9 rounded px-1 font-medium whitespace-nowrap text-ink hover:underline"
      >
        {person.name} <span aria-hidden="true">▾</span>
      </button>
      <div
        id="person-menu"
        popover="auto"
        className="absolute inset-auto top-12 right-4 m-0 w-64 rounded border border-ink bg-sheet text-ink lg:right-7"
      >
        <div className="border-b border-rule px-4 py-3">
          <div className="font-medium">{person.name}</div>
          <div className="text-soft">{person.role}</div>
        </div>
        <div className="flex flex-col items-stretch gap-2 px-4 py-3">{children}</div>
      </div>
    </>
  );
}
