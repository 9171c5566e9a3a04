"use client";

import Link from "next/link";
import type { ReactNode } from "react";
import { writtenNumber } from "@/lib/present/written-number";
import type { WhatIf as Answer } from "@/lib/usecases/forecast-what-if";
import { DrawDialog } from "./draw-dialog";
import { LogDialog } from "./log-dialog";
import type { WhatIfProps } from "./what-if-props";

type Props = Pick<WhatIfProps, "context" | "modelHref" | "presentation"> & { answer: Answer };

/** The real acts behind what was supposed; where there is none, it says where it is done. */
export function WhatIfActs({ answer, context, modelHref, presentation }: Props) {
  const { given } = answer;
  const { locale } = presentation;
  const worked = given.periodMinutes !== null || given.stateMilliamps !== null;
  return (
    <div className="mt-3 flex flex-col gap-2">
      {given.volts !== null && (
        <Act
          words="If that is what the meter shows, log it: the forecast follows."
          act={
            context && (
              <LogDialog
                key={`${given.volts}-${given.kind}`}
                context={context}
                label="Log this voltage"
                opensWith={{ volts: writtenNumber(given.volts, 3, locale), kind: given.kind }}
              />
            )
          }
        />
      )}
      {worked && (
        <Act
          words="If this device alone works so, measure its draw and record it. If all of its model do, change the duty cycle of the model."
          act={
            <>
              {context && (
                <DrawDialog context={context} kind="plain" label="Record a measured draw" />
              )}
              {modelHref && (
                <Link className="textlink" href={modelHref}>
                  Duty cycle of the model
                </Link>
              )}
            </>
          }
        />
      )}
      {given.designation && (
        <Act
          words={`Cells are not planned ahead for one asset: choose ${given.designation} when the swap is recorded, or make it the preferred cell of the device model, and load lists ask for it.`}
          act={
            modelHref && (
              <Link className="textlink" href={modelHref}>
                Preferred cells of the model
              </Link>
            )
          }
        />
      )}
      {!context && <p className="text-soft">A dispatcher can record this.</p>}
    </div>
  );
}

function Act({ words, act }: { words: string; act: ReactNode }) {
  return (
    <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
      <p className="max-w-prose flex-1 basis-64">{words}</p>
      <div className="flex flex-wrap items-center gap-3">{act}</div>
    </div>
  );
}
