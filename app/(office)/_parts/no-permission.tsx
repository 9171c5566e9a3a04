import { LinkButton } from "@/components/ui/button";
import { EmptyState } from "@/components/ui/states";

/** A page that this role may not open, and who may. */
export function NoPermission({ title, who }: { title: string; who: string }) {
  return (
    <>
      <h1 className="sr-only">{title}</h1>
      <EmptyState
        title={`${title} is for ${who}.`}
        action={<LinkButton href="/horizon">Go to Horizon</LinkButton>}
      >
        Ask an administrator if you need it for your work.
      </EmptyState>
    </>
  );
}
