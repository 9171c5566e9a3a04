"use client";

import { useEffect, useRef, useState } from "react";
import { BigButton } from "@/components/ui/big-button";
import { Notice } from "@/components/ui/notice";
import { cameraCanScan, watchForCode } from "@/lib/offline/scan";

/** Scans the code on a device's plate, where the browser can. */
export function ScanCode({ onCode }: { onCode: (code: string) => void }) {
  const [on, setOn] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const [able, setAble] = useState(false);
  const video = useRef<HTMLVideoElement>(null);
  useEffect(() => {
    void cameraCanScan().then(setAble);
  }, []);
  useEffect(() => {
    if (!on || !video.current) return;
    return watchForCode(video.current, {
      found: (code) => {
        setOn(false);
        onCode(code);
      },
      failed: () => {
        setOn(false);
        setTrouble("The camera could not be used. Allow it for this site, or type the tag.");
      },
    });
  }, [on, onCode]);
  if (!able) return null;
  return (
    <>
      {trouble && <Notice kind="warn">{trouble}</Notice>}
      {on && (
        <video
          ref={video}
          muted
          playsInline
          className="w-full bg-ink"
          aria-label="Camera picture"
        />
      )}
      <BigButton onClick={() => setOn(!on)}>{on ? "Stop the camera" : "Scan the code"}</BigButton>
    </>
  );
}
