"use client";

import { FieldLink } from "@/components/ui/field-link";
import { useState } from "react";
import { FieldBar } from "@/components/ui/field-bar";
import { FieldPage } from "@/components/ui/field-page";
import { TextInput } from "@/components/ui/inputs";
import { EmptyState } from "@/components/ui/states";
import { findAsset, searchAssets } from "@/lib/offline/day";
import { AssetCard } from "./asset-card";
import { ScanCode } from "./scan-code";
import type { ScreenProps } from "./screen";

const MOST_SHOWN = 40;

/** Any asset this phone knows: by its tag, its name or its code. */
export function FindScreen({ day, query }: ScreenProps) {
  const [typed, setTyped] = useState("");
  const asset = findAsset(day, query.get("asset"));
  const stopId = query.get("stop");
  if (asset) {
    const href = stopId ? `/stop?id=${stopId}` : "/find";
    return (
      <>
        <FieldBar title={asset.tag} back={{ href, label: "Back" }} />
        <FieldPage>
          <AssetCard heading="h1" {...{ day, asset }} {...(stopId ? { stopId } : {})} />
        </FieldPage>
      </>
    );
  }
  const found = searchAssets(day, typed);
  return (
    <>
      <FieldBar title="Find" heading back={{ href: "/today", label: "Back to the round" }} />
      <FieldPage>
        <TextInput
          {...{ name: "search", label: "Tag, name or site", optional: true, value: typed }}
          hint={`${day.assets.length} assets are on this phone.`}
          type="search"
          autoCapitalize="characters"
          autoComplete="off"
          onChange={(event) => setTyped(event.target.value)}
        />
        <ScanCode onCode={setTyped} />
        {found.length === 0 ? (
          <EmptyState title="Not on this phone.">
            The phone carries the assets at the sites of your rounds. With signal, the office can
            look up any other.
          </EmptyState>
        ) : (
          <ul aria-label="Assets" className="-mx-4 border-y border-rule bg-sheet">
            {found.slice(0, MOST_SHOWN).map((one) => (
              <li key={one.id} className="border-t border-rule first:border-t-0">
                <FieldLink
                  href={`/find?asset=${one.id}`}
                  className="flex min-h-14 flex-col justify-center px-4 py-2"
                >
                  <span className="font-mono text-sm font-semibold">{one.tag}</span>
                  <span className="text-soft">{one.name}</span>
                </FieldLink>
              </li>
            ))}
          </ul>
        )}
        {found.length > MOST_SHOWN && (
          <p className="text-soft">{found.length - MOST_SHOWN} more: type further.</p>
        )}
      </FieldPage>
    </>
  );
}
