"use client";

import { useState } from "react";
import { BigButton } from "@/components/ui/big-button";
import { FieldBar } from "@/components/ui/field-bar";
import { FieldPage } from "@/components/ui/field-page";
import { NumberInput, TextInput } from "@/components/ui/inputs";
import { Keypad } from "@/components/ui/keypad";
import { Notice } from "@/components/ui/notice";
import { fieldStore } from "@/lib/offline/browser-store";
import type { EntryBody } from "@/lib/sync/entries";
import type { DayAsset } from "@/lib/sync/day-pack";
import { FieldChoice } from "./field-chip";
import { go } from "./go";
import { PhotoField } from "./photo-field";
import { PlateView } from "./plate-view";
import type { ScreenProps } from "./screen";
import { decimalSignOf, tenths, thousandths } from "./typed-number";
import { usePictures } from "./use-pictures";
import { usePlate } from "./use-plate";

const MODES = [
  ["resting", "Resting"],
  ["loaded", "Under load"],
] as const;

interface LogFormProps {
  day: ScreenProps["day"];
  asset: DayAsset;
  stopId: string | null;
  back: { href: string; label: string };
}

/** The keypad, and what the reading says as it is typed. */
export function LogForm({ day, asset, stopId, back }: LogFormProps) {
  const { locale } = day.organisation;
  const sign = decimalSignOf(locale);
  const [mode, setMode] = useState<"resting" | "loaded">("resting");
  const [volts, setVolts] = useState("");
  const [celsius, setCelsius] = useState("");
  const [loadMa, setLoadMa] = useState("");
  const [instrument, setInstrument] = useState("");
  const [trouble, setTrouble] = useState<string | null>(null);
  const pictures = usePictures();
  const [first, setFirst] = useState<string | null>(null);
  const millivolts = thousandths(volts);
  const loadUa = mode === "loaded" ? thousandths(loadMa) : null;
  const temperatureDc = tenths(celsius);
  const plate = usePlate(day, asset, { millivolts, kind: mode, loadUa, temperatureDc });
  const surprising = plate?.words?.surprising ?? false;

  const write = async (): Promise<boolean> => {
    if (millivolts === null) {
      setTrouble("Type the voltage first.");
      return false;
    }
    const body: EntryBody = {
      ...{ kind: "reading", assetId: asset.id, millivolts, mode, loadUa, temperatureDc },
      ...{ packId: asset.pack?.id ?? null, stopId, instrument: instrument.trim(), note: "" },
    };
    const fault = await fieldStore().keepSeen(body, pictures.list);
    setTrouble(fault);
    return fault === null;
  };
  const keep = async () => {
    if (await write()) go(back.href, true);
  };
  // Both count: the first is kept as it was, the second is typed anew.
  const again = async () => {
    if (!(await write())) return;
    setFirst(volts);
    setVolts("");
    pictures.clear();
  };

  return (
    <>
      <FieldBar title="Log a voltage" heading back={back} aside={asset.tag} />
      <FieldPage
        foot={
          <>
            {surprising && (
              <p>
                <strong>A surprise: measure again?</strong> Both readings are kept.
              </p>
            )}
            <div className="flex gap-2.5">
              {surprising && <BigButton onClick={() => void again()}>Measure again</BigButton>}
              <BigButton
                kind="go"
                disabled={millivolts === null || pictures.busy}
                onClick={() => void keep()}
              >
                Keep this reading
              </BigButton>
            </div>
          </>
        }
      >
        <FieldChoice quiet label="Measured" options={MODES} value={mode} onChange={setMode} />
        <p className="font-serif text-6xl font-medium" aria-live="polite">
          {volts || "–"} <span className="text-3xl text-soft">V</span>
        </p>
        {first && (
          <Notice kind="done">
            {first} V is kept. Measure again and type what the meter shows now.
          </Notice>
        )}
        <PlateView plate={plate} />
        {trouble && <Notice kind="trouble">{trouble}</Notice>}
        <Keypad label="Voltage in volts" value={volts} onChange={setVolts} decimalSign={sign} />
        {mode === "loaded" && (
          <NumberInput
            {...{ name: "load", label: "Load", unit: "mA", optional: true, value: loadMa }}
            hint="Left empty: the device’s own peak."
            onChange={(event) => setLoadMa(event.target.value)}
          />
        )}
        <NumberInput
          {...{ name: "celsius", label: "Temperature", unit: "°C", optional: true, value: celsius }}
          onChange={(event) => setCelsius(event.target.value)}
        />
        <PhotoField pictures={pictures} />
        <TextInput
          {...{ name: "meter", label: "Meter", optional: true, maxLength: 80, value: instrument }}
          onChange={(event) => setInstrument(event.target.value)}
        />
      </FieldPage>
    </>
  );
}
