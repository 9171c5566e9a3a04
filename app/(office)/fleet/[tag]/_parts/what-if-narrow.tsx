"use client";

import { SpanStrip } from "@/components/charts/span-strip";
import { StripAxis } from "@/components/charts/strip-axis";
import { toneText } from "@/components/charts/tone-class";
import type { WhatIfModel } from "@/lib/present/what-if";

/** Both forecasts one above the other, as wide as a phone. */
export function WhatIfNarrow({ model }: { model: WhatIfModel }) {
  return (
    <div className="overflow-hidden border-y border-rule md:hidden">
      <StripAxis axis={model.axis} />
      {model.rows.map((row) => (
        <div key={row.key} className="border-t border-hair py-2">
          <SpanStrip scale={model.scale} model={row.strip} />
          <p>
            <b>{row.label}</b>:{" "}
            <span className={`font-semibold ${toneText[row.tone]}`}>{row.window.likely}</span>,{" "}
            {row.away}
          </p>
          <p className="text-soft">
            {row.window.from} – {row.window.to} · {row.left} left · draws {row.draw}
          </p>
        </div>
      ))}
    </div>
  );
}
