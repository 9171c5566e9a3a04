import Link from "next/link";

/** An asset's tag in a table or a list, leading to its page. */
export function TagLink({ tag }: { tag: string }) {
  return (
    <Link
      href={`/fleet/${encodeURIComponent(tag)}`}
      // A page of a hundred assets would fetch a hundred pages that nobody opens.
      prefetch={false}
      className="font-mono text-xs font-semibold hover:underline"
    >
      {tag}
    </Link>
  );
}
