import { z } from "zod";
import { listMails as query, MAIL_STATES } from "@/db/queries/mail-log";
import { getOrganisation } from "@/db/queries/organisation";
import { filterWord, listEntries, PAGE_SIZE, pageWindow } from "./list-entries";
import { defineUseCase } from "./use-case";

/** One page of the mails that went out or should have. */
export const listMails = defineUseCase({
  name: "list-mails",
  allow: { roles: ["administrator"] },
  input: z.object({ ...listEntries, state: filterWord(MAIL_STATES) }),
  async run(deps, _actor, given) {
    const [organisation, found] = await Promise.all([
      getOrganisation(deps.db),
      query(deps.db, { ...given, ...pageWindow(given.page) }),
    ]);
    return { ...found, organisation, given, pageSize: PAGE_SIZE, now: deps.now() };
  },
});

export type MailsView = Awaited<ReturnType<typeof listMails>>;
