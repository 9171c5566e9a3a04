import Link from "next/link";
import type { ButtonHTMLAttributes, ReactNode } from "react";

export type ButtonKind = "plain" | "go" | "danger" | "quiet";

const base =
  "inline-flex min-h-9 items-center justify-center gap-2 rounded border px-3.5 py-1.5 text-base font-medium whitespace-nowrap no-print disabled:cursor-not-allowed disabled:border-rule disabled:bg-hair disabled:text-soft aria-disabled:border-rule aria-disabled:bg-hair aria-disabled:text-soft";

const kinds: Record<ButtonKind, string> = {
  plain: "border-ink bg-sheet text-ink hover:bg-hair",
  go: "border-spruce bg-spruce text-on-spruce hover:border-ink",
  danger: "border-brick-line bg-sheet text-brick-ink hover:bg-brick-tint",
  quiet: "border-transparent bg-transparent text-dusk-ink hover:border-rule hover:bg-sheet",
};

export interface ButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  kind?: ButtonKind;
  /** Words shown instead of the label while the work runs; the button is then inert. */
  busy?: string | false;
  children: ReactNode;
}

/** A button. `kind="go"` is the one main act of a page. */
export function Button({ kind = "plain", busy, className = "", children, ...rest }: ButtonProps) {
  return (
    <button
      type="button"
      {...rest}
      disabled={rest.disabled || Boolean(busy)}
      aria-busy={busy ? true : undefined}
      className={`${base} ${kinds[kind]} ${className}`}
    >
      {busy || children}
    </button>
  );
}

export interface LinkButtonProps {
  href: string;
  kind?: ButtonKind;
  /** Ask for a file instead of a page: a plain anchor with `download`. */
  download?: boolean;
  children: ReactNode;
}

/** A link that looks like a button: it goes somewhere, or fetches a file. */
export function LinkButton({ href, kind = "plain", download, children }: LinkButtonProps) {
  const className = `${base} ${kinds[kind]}`;
  if (download) {
    return (
      <a href={href} download className={className}>
        {children}
      </a>
    );
  }
  return (
    <Link href={href} prefetch={false} className={className}>
      {children}
    </Link>
  );
}
