import { Section } from "@/components/ui/page-head";
import { coldSnapSentence, movedWords } from "@/lib/present/forecast-moved";
import type { Explanation } from "@/lib/usecases/explain-forecast";
import type { AssetView } from "@/lib/usecases/read-asset";
import { basisLine, basisSentences } from "./asset-basis";

/** On what the forecast rests, what moved it last, and a stop in the cold that passes. */
export function AssetReasons(props: { view: AssetView; explanation: Explanation | null }) {
  const { view, explanation } = props;
  const line = basisLine(view);
  return (
    <Section title="What the forecast rests on">
      <div className="grid gap-x-8 gap-y-4 px-3 py-3 lg:grid-cols-2">
        <div>
          {line && <p className="mb-2 text-lg">{line}.</p>}
          <ul className="flex max-w-prose flex-col gap-1 text-soft">
            {basisSentences(view).map((sentence) => (
              <li key={sentence}>{sentence}</li>
            ))}
          </ul>
        </div>
        <div className="flex flex-col gap-4">
          <LastMoved view={view} explanation={explanation} />
          {explanation?.coldSnap && (
            <div>
              <h3 className="caps">A stop in the cold</h3>
              <p className="max-w-prose">
                {coldSnapSentence(explanation.coldSnap, view.now, view.organisation)}
              </p>
            </div>
          )}
        </div>
      </div>
    </Section>
  );
}

function LastMoved({ view, explanation }: { view: AssetView; explanation: Explanation | null }) {
  const moved = explanation?.moved;
  const words = moved && movedWords(moved, view.now, view.organisation);
  return (
    <div>
      <h3 className="caps">What moved it last</h3>
      {words ? (
        <p className="max-w-prose">
          {words.what}: <b>{words.shift}</b>
          {words.dates && <span className="text-soft"> ({words.dates})</span>}.
        </p>
      ) : (
        <p className="max-w-prose text-soft">
          Nothing has been logged since this pack went in. The first voltage narrows the dates most.
        </p>
      )}
    </div>
  );
}
