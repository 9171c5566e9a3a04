import { Section } from "@/components/ui/page-head";
import { PhotoStrip } from "@/components/ui/photo-strip";
import { formatNumber } from "@/lib/present/locale";
import { formatInstant } from "@/lib/present/format-time";
import type { AssetView } from "@/lib/usecases/read-asset";

type Row = AssetView["photos"][number];

const ABOUT: Readonly<Record<string, string>> = {
  reading: "with a voltage",
  swap: "with a swap",
  cannot: "the site: could not be done",
  note: "seen at the site",
};

/** What technicians photographed: this asset, and its site as a whole; newest first. */
export function AssetPhotos({ view }: { view: AssetView }) {
  const { photos, organisation } = view;
  if (photos.length === 0) return null;
  const entries = [...new Set(photos.map((photo) => photo.entryId))];
  return (
    <Section title="Photos" aside={`${photos.length}`}>
      <ul>
        {entries.map((entryId) => {
          const own = photos.filter((photo) => photo.entryId === entryId);
          const [first] = own;
          if (!first) return null;
          const when = formatInstant(first.takenAt, organisation);
          return (
            <li key={entryId} className="border-t border-rule px-3 py-2 first:border-t-0">
              <p>
                {when} · {first.personName} ·{ABOUT[first.kind] ?? first.kind}
                {positionWords(first, organisation.locale)}
                {saidWith(first) && <span className="text-soft"> · “{saidWith(first)}”</span>}
              </p>
              <PhotoStrip
                photos={own.map(({ id }, n) => ({
                  ...{ id, label: `Photo ${n + 1} of ${own.length}, ${when}, ${first.personName}` },
                }))}
              />
            </li>
          );
        })}
      </ul>
    </Section>
  );
}

function saidWith({ body }: Row): string {
  const { text, note } = (body ?? {}) as { text?: string; note?: string };
  return text || note || "";
}

/** " · 52.50010° N, 0.10020° E": five decimals are about a metre. */
function positionWords({ latitude, longitude }: Row, locale: string): string {
  if (latitude === null || longitude === null) return "";
  const degrees = (value: number, [plus, minus]: readonly [string, string]) =>
    `${formatNumber(Math.abs(value), locale, 5)}° ${value < 0 ? minus : plus}`;
  return ` · ${degrees(latitude, ["N", "S"])}, ${degrees(longitude, ["E", "W"])}`;
}
