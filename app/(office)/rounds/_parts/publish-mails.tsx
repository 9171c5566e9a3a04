export interface MailsPreview {
  /** "3 visits moved, 1 new"; empty where nothing binds yet. */
  readonly difference: string;
  readonly unchanged: number;
  readonly mails: readonly {
    readonly kind: "published" | "changed" | "cancelled";
    readonly name: string;
    readonly email: string;
    readonly day: string;
    readonly stops: number;
    /** What becomes of the order the technician gave the stops on the phone. */
    readonly ownOrder: "none" | "kept" | "replaced";
  }[];
}

const OWN_ORDER = {
  kept: "Their own order of the stops, given since this plan was opened, is kept.",
  replaced: "This replaces their own order of the stops; the mail and the phone say so.",
} as const;
const NEWS = { published: "new", changed: "changed", cancelled: "cancelled" } as const;

/** Who gets which mail, and what becomes of an order of the technician's own. */
export function PublishMails({ preview }: { preview: MailsPreview }) {
  const { mails, unchanged, difference } = preview;
  if (mails.length === 0) return <p>Nothing in this plan is new to anybody.</p>;
  return (
    <>
      {difference && <p className="mb-2">{difference}</p>}
      <p className="mb-2">
        {mails.length === 1 ? "One mail goes" : `${mails.length} mails go`} out, each with its
        calendar entry.{" "}
        {unchanged > 0 && `${unchanged} published rounds stay as they are; nobody is written to.`}
      </p>
      <ul className="max-h-72 overflow-y-auto border-y border-rule">
        {mails.map((mail) => (
          <li
            key={`${mail.email} ${mail.day}`}
            className="grid grid-cols-[minmax(0,1fr)_7rem_6rem] gap-2 border-t border-hair py-1 first:border-t-0"
          >
            <span className="min-w-0 truncate">
              {mail.name} <span className="text-soft">{mail.email}</span>
            </span>
            <span>{mail.day}</span>
            <span className={mail.kind === "cancelled" ? "text-brick-ink" : "text-soft"}>
              {NEWS[mail.kind]}
              {mail.stops > 0 && `, ${mail.stops} stops`}
            </span>
            {mail.ownOrder !== "none" && (
              <span className="col-span-3 text-soft">{OWN_ORDER[mail.ownOrder]}</span>
            )}
          </li>
        ))}
      </ul>
    </>
  );
}
