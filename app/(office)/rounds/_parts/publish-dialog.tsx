"use client";

import { useMutation, useQuery } from "@tanstack/react-query";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { Checkbox } from "@/components/ui/inputs";
import { Notice } from "@/components/ui/notice";
import { Skeleton } from "@/components/ui/states";
import { toast } from "@/components/ui/toast";
import { fetchJson } from "../../_parts/fetch-json";
import { type MailsPreview, PublishMails } from "./publish-mails";
import type { BoardActs } from "./use-board";

interface Preview extends MailsPreview {
  readonly shortages: readonly {
    readonly designation: string;
    readonly cells: number;
    readonly tags: readonly string[];
  }[];
  readonly stranded: readonly string[];
  readonly contacts: readonly { readonly name: string; readonly siteName: string }[];
}

/** Names everybody who will get a mail, before any is sent. */
export function PublishDialog({ acts, onClose }: { acts: BoardActs; onClose: () => void }) {
  const { plan } = acts.board;
  const router = useRouter();
  const [tell, setTell] = useState(true);
  const address = `/api/v1/plans/${plan?.id}/publication`;
  const preview = useQuery({
    queryKey: ["publication", plan?.id, plan?.version],
    queryFn: () => fetchJson<Preview>(address),
    staleTime: 0,
  });
  const publish = useMutation({
    mutationFn: () =>
      fetchJson<{ mails: number }>(address, {
        method: "POST",
        body: { version: plan?.version, tellContacts: tell },
      }),
    onSuccess: ({ mails }) => {
      toast({ text: `Published. ${mails === 1 ? "1 mail is" : `${mails} mails are`} on the way.` });
      onClose();
      void acts.again();
      router.refresh();
    },
  });
  const { data } = preview;
  const nothing = data !== undefined && data.mails.length === 0;
  return (
    <Dialog
      open
      title={`Publish ${plan?.name ?? "this plan"}`}
      onClose={onClose}
      actions={
        <>
          <Button onClick={onClose}>Not yet</Button>
          <Button
            kind="go"
            busy={publish.isPending && "Publishing…"}
            disabled={!data || nothing || data.stranded.length > 0}
            onClick={() => publish.mutate()}
          >
            Publish and send
          </Button>
        </>
      }
    >
      {publish.error && <Notice kind="trouble">{publish.error.message}</Notice>}
      {preview.error && <Notice kind="trouble">{preview.error.message}</Notice>}
      {!data && !preview.error && (
        <Skeleton label="Looking who gets a mail" rows={4} shape="lines" />
      )}
      {data && data.stranded.length > 0 && (
        <Notice kind="trouble">
          {data.stranded.join("; ")}. Move these stops or take them out first.
        </Notice>
      )}
      {data && data.shortages.length > 0 && (
        <Notice kind="warn">
          Stores and vans lack cells: {data.shortages.map(shortageWords).join("; ")}.
        </Notice>
      )}
      {data && <PublishMails preview={data} />}
      {data && data.contacts.length > 0 && (
        <div className="mt-3">
          <Checkbox
            name="tell"
            label={`Also tell ${data.contacts.length === 1 ? "the site contact" : `the ${data.contacts.length} site contacts`} when to expect somebody`}
            checked={tell}
            onChange={(event) => setTell(event.target.checked)}
          />
          <details className="mt-1 text-sm text-soft">
            <summary>Who they are</summary>
            <p className="max-h-32 overflow-y-auto">
              {[...new Set(data.contacts.map((c) => `${c.name} (${c.siteName})`))].join(", ")}
            </p>
          </details>
        </div>
      )}
    </Dialog>
  );
}

function shortageWords({ designation, cells, tags }: Preview["shortages"][number]): string {
  const shown = tags.slice(0, 6).join(", ");
  const more = tags.length > 6 ? ` and ${tags.length - 6} more` : "";
  return `${cells} × ${designation} in one lot, for ${shown}${more}`;
}
