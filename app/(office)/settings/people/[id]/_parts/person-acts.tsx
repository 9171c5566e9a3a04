"use client";

import type { ReactNode } from "react";
import { ActionForm, type FormAction } from "@/components/forms/action-form";
import { inviteAgainAction, signPersonOutAction, switchPersonAction } from "../../actions";

export interface PersonActsProps {
  id: string;
  name: string;
  state: "active" | "invited" | "off";
  isSelf: boolean;
}

/** Invite again, sign out everywhere, switch off or on. */
export function PersonActs({ id, name, state, isSelf }: PersonActsProps) {
  const off = state === "off";
  return (
    <div className="divide-y divide-hair">
      {state === "invited" && (
        <Act
          {...{ id, submit: "Invite again", done: "A new invitation is on its way." }}
          action={inviteAgainAction}
        >
          Has not come yet. A new invitation replaces the earlier link.
        </Act>
      )}
      {state === "active" && (
        <Act
          {...{ id, submit: "Sign out everywhere", done: `${name} is signed out everywhere.` }}
          action={signPersonOutAction}
        >
          Ends the sign-in on every device at its next request; for a lost phone.
        </Act>
      )}
      {isSelf ? (
        <p className="px-3 py-3 text-soft">You cannot switch yourself off.</p>
      ) : (
        <Act
          {...{ id, submit: off ? "Switch on" : "Switch off", danger: !off }}
          done={off ? `${name} may sign in again.` : `${name} is switched off.`}
          action={switchPersonAction}
          active={off}
        >
          {off
            ? "May sign in again with the same password."
            : "Loses access at the next request. What they did stays in the record."}
        </Act>
      )}
    </div>
  );
}

interface ActProps<Result> {
  id: string;
  submit: string;
  done: string;
  danger?: boolean;
  active?: boolean;
  action: FormAction<Result>;
  children: ReactNode;
}

function Act<Result>(props: ActProps<Result>) {
  const { id, submit, done, danger, active, action, children } = props;
  return (
    <div className="px-3 py-3">
      <ActionForm
        action={action}
        submit={submit}
        busy="Working…"
        done={done}
        kind={danger ? "danger" : "plain"}
      >
        <input type="hidden" name="id" value={id} />
        {active !== undefined && (
          <input type="hidden" name="active" value={active ? "on" : "off"} />
        )}
        <p className="text-soft">{children}</p>
      </ActionForm>
    </div>
  );
}
