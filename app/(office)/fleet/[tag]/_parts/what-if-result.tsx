"use client";

import { SpanStrip } from "@/components/charts/span-strip";
import { StripAxis } from "@/components/charts/strip-axis";
import { toneText } from "@/components/charts/tone-class";
import { Notice } from "@/components/ui/notice";
import { whatIfModel } from "@/lib/present/what-if";
import type { WhatIf as Answer } from "@/lib/usecases/forecast-what-if";
import { WhatIfNarrow } from "./what-if-narrow";
import type { WhatIfProps } from "./what-if-props";

type Props = Pick<WhatIfProps, "subject" | "today" | "presentation"> & { answer: Answer };

/** Both forecasts on one axis, their dates side by side, and the difference in days. */
export function WhatIfResult({ answer, subject, today, presentation }: Props) {
  const asked = { ...subject, today, ...answer };
  const model = whatIfModel({ ...asked, room: "wide" }, presentation);
  return (
    <div className="mt-4 border-t border-rule pt-3">
      <p className="mb-2 text-lg">
        Likely cut-off <b>{model.shift}</b>: {model.rows[1]?.window.likely} instead of{" "}
        {model.rows[0]?.window.likely}.
      </p>
      {answer.doubt && (
        <Notice kind="warn">This voltage would be marked as unlikely: {answer.doubt}.</Notice>
      )}
      <div
        role="region"
        aria-label="Forecast as it is and what if"
        tabIndex={0}
        className="relative overflow-x-auto border-rule md:border"
      >
        <WhatIfNarrow model={whatIfModel({ ...asked, room: "narrow" }, presentation)} />
        <table className="w-full border-collapse max-md:hidden">
          <thead>
            <tr className="border-b border-ink">
              <th scope="col" className="caps px-2.5 py-1.5 text-left align-bottom">
                Forecast
              </th>
              <th scope="col" className="p-0 align-bottom" style={{ width: model.axis.widthPx }}>
                <span className="sr-only">On a time axis</span>
                <StripAxis axis={model.axis} />
              </th>
              {["Cut-off window", "Likely", "Left", "Draw"].map((head) => (
                <th key={head} scope="col" className="caps px-2.5 py-1.5 text-left align-bottom">
                  {head}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {model.rows.map((row) => (
              <tr key={row.key} className="border-t border-hair whitespace-nowrap first:border-t-0">
                <th scope="row" className="px-2.5 text-left font-medium">
                  {row.label}
                </th>
                <td className="p-0">
                  <SpanStrip scale={model.scale} model={row.strip} />
                </td>
                <td className="px-2.5">
                  {row.window.from} – {row.window.to}
                </td>
                <td className={`px-2.5 font-semibold ${toneText[row.tone]}`}>
                  {row.window.likely} <span className="font-normal text-soft">{row.away}</span>
                </td>
                <td className="px-2.5">{row.left}</td>
                <td className="px-2.5">{row.draw}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </div>
  );
}
