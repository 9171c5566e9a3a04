import Link from "next/link";
import { EmptyState } from "@/components/ui/states";
import { formatInstant } from "@/lib/present/format-time";
import { Section } from "@/components/ui/page-head";
import { PhotoStrip } from "@/components/ui/photo-strip";
import type { FieldMatter, FieldMatters } from "@/lib/usecases/list-field-matters";
import { MatterActs } from "./matter-acts";
import { matterWords } from "./matter-words";

/** What waits for a decision, oldest first. */
export function MatterList({ matters, mayDecide }: { matters: FieldMatters; mayDecide: boolean }) {
  const { open } = matters;
  if (open.length === 0) {
    return (
      <EmptyState title="Nothing from the field waits for a decision.">
        What a phone sends and cannot be applied stands here, with what is short and what could not
        be done.
      </EmptyState>
    );
  }
  const count = `${open.length} ${open.length === 1 ? "matter" : "matters"}`;
  return (
    <Section title="To decide" aside={count}>
      <ul>
        {open.map((matter) => (
          <Matter key={matter.id} {...{ matter, matters, mayDecide }} />
        ))}
      </ul>
    </Section>
  );
}

function Matter(props: { matter: FieldMatter; matters: FieldMatters; mayDecide: boolean }) {
  const { matter, matters, mayDecide } = props;
  const words = matterWords(matter, matters);
  const late = matter.kind === "refused" || matter.kind === "conflict";
  return (
    <li className="grid gap-x-6 gap-y-2 border-t border-rule px-3 py-3 first:border-t-0 lg:grid-cols-[11rem_minmax(0,1fr)_auto]">
      <div>
        <p className={`caps ${late ? "text-brick-ink" : "text-honey-ink"}`}>{words.kind}</p>
        <p className="text-sm text-soft">
          {matter.personName}
          <span className="block">{formatInstant(matter.raisedAt, matters.organisation)}</span>
        </p>
      </div>
      <div className="min-w-0">
        <h3 className="font-sans text-base font-semibold">{words.title}</h3>
        <p className="break-words">{words.said}</p>
        {words.why && <p className="break-words text-soft">{words.why}</p>}
        <PhotoStrip photos={matters.photos.get(matter.entryId) ?? []} />
        <p className="flex gap-4 text-sm">
          {matter.tag && (
            <Link className="textlink" href={`/fleet/${encodeURIComponent(matter.tag)}`}>
              Open {matter.tag}
            </Link>
          )}
          {matter.roundId && (
            <Link className="textlink" href={`/rounds?round=${matter.roundId}`}>
              Open the round
            </Link>
          )}
          {matter.kind === "shortage" && (
            <Link className="textlink" href="/stores/lots">
              Look where cells lie
            </Link>
          )}
        </p>
      </div>
      {mayDecide && <MatterActs matter={matter} title={words.title} />}
    </li>
  );
}
