import { FieldLink } from "@/components/ui/field-link";
import { EmptyState } from "@/components/ui/states";

export default function NotFound() {
  return (
    <main id="main" className="page">
      <h1 className="sr-only">Page not found</h1>
      <EmptyState
        title="There is no page at this address."
        action={
          // A plain one: this page travels with every other, the phone's among them.
          <FieldLink href="/" className="textlink">
            Go to your first page
          </FieldLink>
        }
      >
        It may have been removed, or the address was mistyped.
      </EmptyState>
    </main>
  );
}
