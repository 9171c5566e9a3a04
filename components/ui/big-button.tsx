import { FieldLink } from "./field-link";
import type { ButtonHTMLAttributes, ReactNode } from "react";

export type BigButtonKind = "plain" | "go" | "danger";

const base =
  "flex min-h-14 w-full items-center gap-3 rounded border-[1.5px] px-4 py-3 text-left text-lg font-semibold disabled:border-rule disabled:bg-hair disabled:text-soft";

const kinds: Record<BigButtonKind, string> = {
  plain: "border-ink bg-sheet text-ink active:bg-hair",
  go: "border-spruce bg-spruce text-on-spruce active:border-ink",
  danger: "border-brick-line bg-sheet text-brick-ink active:bg-brick-tint",
};

export interface BigButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  kind?: BigButtonKind;
  /** Makes it a link. */
  href?: string;
  /** A fact at the right end: "2 left". */
  aside?: ReactNode;
  children: ReactNode;
}

/** A phone page's act: at least 56 px tall, as wide as the page, for a gloved thumb. */
export function BigButton({ kind = "plain", href, aside, children, ...rest }: BigButtonProps) {
  const className = `${base} ${kinds[kind]}`;
  const inside = (
    <>
      <span className="flex-1">{children}</span>
      {aside && <span className="font-normal">{aside}</span>}
    </>
  );
  if (href !== undefined) {
    return (
      <FieldLink href={href} className={className}>
        {inside}
      </FieldLink>
    );
  }
  return (
    <button type="button" {...rest} className={className}>
      {inside}
    </button>
  );
}
