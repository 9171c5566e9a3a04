import { LinkButton } from "@/components/ui/button";
import { EmptyState } from "@/components/ui/states";

export default function NotFound() {
  return (
    <main id="main" className="page">
      <h1 className="sr-only">Page not found</h1>
      <EmptyState
        title="There is no page at this address."
        action={<LinkButton href="/">Go to your first page</LinkButton>}
      >
        It may have been removed, or the address was mistyped.
      </EmptyState>
    </main>
  );
}
