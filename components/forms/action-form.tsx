"use client";

import { type ReactNode, useActionState } from "react";
import { Button, type ButtonKind } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { toast } from "@/components/ui/toast";
import type { ActionState } from "@/lib/server/define-action";

export type FormAction<Result> = (
  state: ActionState<Result>,
  form: FormData,
) => Promise<ActionState<Result>>;

/** What the fields of a form ask: what to show, and what is wrong. */
export interface Entries {
  /** For TextInput, NumberInput, TextArea and Select: what was typed last, else the stored value. */
  text(
    name: string,
    stored?: string | number | null,
  ): { name: string; defaultValue: string; error: string | undefined };
  /** For Checkbox. */
  tick(name: string, stored?: boolean): { name: string; defaultChecked: boolean; key: string };
  /** What is wrong with an entry that has several controls. */
  fault(name: string): string | undefined;
}

export interface ActionFormProps<Result> {
  action: FormAction<Result>;
  submit: string;
  /** Words on the button while it works. */
  busy?: string;
  kind?: ButtonKind;
  /** Said in a toast when it is done. */
  done?: string | ((result: Result) => string);
  /** Called when it is done, for example to close a dialog. */
  onDone?: (result: Result) => void;
  /** Further acts beside the button. */
  aside?: ReactNode;
  /** Makes the button as tall as a thumb. */
  tall?: boolean;
  children?: ((entries: Entries) => ReactNode) | ReactNode;
}

/** A form on a server action: keeps what was typed, names each fault beside its field. */
export function ActionForm<Result>(props: ActionFormProps<Result>) {
  const { children } = props;
  const [state, act, busy] = useActionState(
    async (before: ActionState<Result>, form: FormData): Promise<ActionState<Result>> => {
      const after = await props.action(before, form);
      if (after.status === "done") announce(props, after.result);
      return after;
    },
    { status: "idle" },
  );
  return (
    <form action={act} className="flex flex-col gap-4">
      {state.status === "error" && <Notice kind="trouble">{state.message}</Notice>}
      {typeof children === "function" ? children(entriesOf(state)) : children}
      <div className="flex flex-wrap items-center gap-2">
        <Button
          type="submit"
          kind={props.kind ?? "go"}
          busy={busy && (props.busy ?? "Saving…")}
          className={props.tall ? "min-h-12 flex-1" : ""}
        >
          {props.submit}
        </Button>
        {props.aside}
      </div>
    </form>
  );
}

function announce<Result>(props: ActionFormProps<Result>, result: Result): void {
  const { done, onDone } = props;
  if (done) toast({ text: typeof done === "string" ? done : done(result) });
  onDone?.(result);
}

function entriesOf<Result>(state: ActionState<Result>): Entries {
  const typed = state.status === "error" ? state.values : null;
  const fault = (name: string) =>
    state.status === "error" ? state.faults.find((f) => f.field === name)?.message : undefined;
  return {
    fault,
    text: (name, stored) => ({
      name,
      defaultValue: typed?.[name] ?? String(stored ?? ""),
      error: fault(name),
    }),
    tick: (name, stored = false) => {
      const defaultChecked = typed ? typed[name] === "on" : stored;
      // React resets a form after its action; a tick only follows a new default anew.
      return { name, defaultChecked, key: `${name}-${defaultChecked}` };
    },
  };
}
