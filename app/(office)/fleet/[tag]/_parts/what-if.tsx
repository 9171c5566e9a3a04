"use client";

import { type FormEvent, useState, useTransition } from "react";
import { Button } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import type { ActionState } from "@/lib/server/define-action";
import type { WhatIf as Answer } from "@/lib/usecases/forecast-what-if";
import { whatIfAction } from "../actions";
import { WhatIfActs } from "./what-if-acts";
import { WhatIfFields } from "./what-if-fields";
import type { WhatIfProps } from "./what-if-props";
import { WhatIfResult } from "./what-if-result";

/** Asks what the forecast would be; what was typed stays, nothing is kept. */
export function WhatIf(props: WhatIfProps) {
  const [state, setState] = useState<ActionState<Answer>>({ status: "idle" });
  const [busy, start] = useTransition();
  const ask = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    const form = new FormData(event.currentTarget);
    start(async () => {
      const answer = await whatIfAction({ status: "idle" }, form);
      start(() => setState(answer));
    });
  };
  const faults = state.status === "error" ? state.faults : [];
  return (
    <div className="px-3 py-3">
      <form onSubmit={ask} noValidate aria-label="What if">
        <input type="hidden" name="tag" value={props.subject.tag} />
        {state.status === "error" && <Notice kind="trouble">{state.message}</Notice>}
        <WhatIfFields {...props} fault={(name) => faults.find((f) => f.field === name)?.message} />
        <div className="mt-3">
          <Button type="submit" busy={busy && "Forecasting…"}>
            Compare
          </Button>
        </div>
      </form>
      {state.status === "done" && (
        <div aria-live="polite">
          <WhatIfResult answer={state.result} {...props} />
          <WhatIfActs answer={state.result} {...props} />
        </div>
      )}
    </div>
  );
}
