import { z } from "zod";
import { claimDigest, duePacks, listDigestSettings } from "@/db/queries/digests";
import { chancesWithin } from "@/db/queries/horizon-figures";
import { findOrganisation, type Organisation } from "@/db/queries/organisation";
import type { DigestLine, DigestProps } from "@/emails/mail-props";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { shareLabel } from "@/lib/present/format-share";
import { OUT_PERMILLE } from "@/lib/present/horizon";
import { countQuantile, poissonBinomial } from "@/lib/stats/poisson-binomial";
import { digestDue } from "./digest-due";
import { queueMail } from "./queue-mail";
import { type Deps, defineUseCase } from "./use-case";

/** Packs a digest lists; the rest are counted. */
const LISTED = 30;

type Reader = Awaited<ReturnType<typeof listDigestSettings>>[number];

/** Orders the digest of everyone whose day and hour have come; safe to run as often as wished. */
export const sendDigests = defineUseCase({
  name: "send-digests",
  allow: { system: true },
  input: z.object({}),
  async run(deps): Promise<{ ordered: number }> {
    const organisation = await findOrganisation(deps.db);
    if (!organisation) return { ordered: 0 };
    const readers = await listDigestSettings(deps.db);
    let ordered = 0;
    for (const reader of readers) {
      if (!digestDue(reader, deps.now(), organisation.timeZone)) continue;
      if (await orderDigest(deps, organisation, reader)) ordered += 1;
    }
    return { ordered };
  },
});

async function orderDigest(
  deps: Deps,
  organisation: Organisation,
  reader: Reader,
): Promise<boolean> {
  const day = dayOfInstant(deps.now(), organisation.timeZone);
  const props = await digestProps(deps, organisation, reader, day);
  return deps.db.transaction().execute(async (trx) => {
    if (!(await claimDigest(trx, reader.personId, day))) return false;
    await queueMail(trx, deps, {
      template: "due-digest",
      toEmail: reader.email,
      toPersonId: reader.personId,
      subject: `${props.outNow.length} out, ${props.expected.mean} due in ${reader.horizonDays} days`,
      props: { ...props },
      idempotencyKey: `digest/${reader.personId}/${day}`,
    });
    return true;
  });
}

async function digestProps(
  deps: Deps,
  organisation: Organisation,
  reader: Reader,
  day: string,
): Promise<DigestProps> {
  const { locale, timeZone, currency } = organisation;
  const now = deps.now();
  const [packs, chances] = await Promise.all([
    duePacks(deps.db, now, day, reader.horizonDays),
    chancesWithin(deps.db, null, reader.horizonDays, { now, today: day }),
  ]);
  const lines = packs.map((pack) => lineOf(pack, organisation));
  const listed = lines.slice(0, LISTED);
  const mass = poissonBinomial(chances);
  return {
    organisation: organisation.name,
    locale,
    timeZone,
    currency,
    name: reader.name,
    url: `${deps.appUrl}/horizon`,
    day,
    horizonDays: reader.horizonDays,
    outNow: listed.filter((line) => line.isOut),
    due: listed.filter((line) => !line.isOut),
    more: lines.length - listed.length,
    expected: {
      p05: countQuantile(mass, 0.05),
      mean: Math.round(chances.reduce((sum, chance) => sum + chance, 0)),
      p95: countQuantile(mass, 0.95),
    },
    notBooked: listed.filter((line) => line.visitOn === null).length,
  };
}

type DuePack = Awaited<ReturnType<typeof duePacks>>[number];

function lineOf(
  pack: DuePack,
  { locale, timeZone }: Organisation,
): DigestLine & { isOut: boolean } {
  const isOut = pack.outNowPermille >= OUT_PERMILLE;
  const { tag, assetName, siteName, visitOn } = pack;
  return {
    ...{ isOut, tag, assetName, siteName, visitOn },
    left: shareLabel({ share: pack.shareLeftPermille / 1000, isOut }, locale),
    p05: dayOfInstant(pack.p05, timeZone),
    p50: dayOfInstant(pack.p50, timeZone),
    p95: dayOfInstant(pack.p95, timeZone),
  };
}
