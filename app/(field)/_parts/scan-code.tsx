"use client";

import { useEffect, useRef, useState } from "react";
import { BigButton } from "@/components/ui/big-button";
import { Notice } from "@/components/ui/notice";
import { hasCamera, watchForCode } from "@/lib/offline/scan";

/** Scans the code on a device’s plate; typing the tag is always possible beside it. */
export function ScanCode({ onCode }: { onCode: (code: string) => void }) {
  const [on, setOn] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const video = useRef<HTMLVideoElement>(null);
  useEffect(() => {
    if (!on || !video.current) return;
    return watchForCode(video.current, {
      found: (code) => {
        setOn(false);
        onCode(code);
      },
      failed: (why) => {
        setOn(false);
        setTrouble(why);
      },
    });
  }, [on, onCode]);
  if (!hasCamera()) return null;
  const press = () => {
    setTrouble(null);
    setOn(!on);
  };
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
      <BigButton onClick={press}>{on ? "Stop the camera" : "Scan the code"}</BigButton>
    </>
  );
}
