import type { AnchorHTMLAttributes } from "react";

/**
 * A link between phone pages: a plain one. The phone answers it without asking the server, so that
 * it needs none of what the framework's links fetch ahead.
 */
export function FieldLink({ href, ...rest }: AnchorHTMLAttributes<HTMLAnchorElement>) {
  return <a href={href} {...rest} />;
}
