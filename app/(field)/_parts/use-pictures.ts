"use client";

import { useEffect, useRef, useState } from "react";
import type { Picture } from "@/lib/offline/keep-with-photos";
import { fieldStore } from "@/lib/offline/browser-store";
import { positionOf } from "@/lib/offline/photo-position";
import { shrinkPhoto } from "@/lib/offline/shrink-photo";

/** A picture with an address to show it by. */
export interface ShownPicture extends Picture {
  readonly url: string;
}

const MOST = 12;

export interface Pictures {
  readonly list: readonly ShownPicture[];
  readonly busy: boolean;
  readonly trouble: string | null;
  readonly add: (files: readonly File[]) => Promise<void>;
  readonly remove: (id: string) => void;
  readonly clear: () => void;
}

/** The photos of the entry being made: small, and without position unless the
 * organisation keeps it, as soon as they are taken. */
export function usePictures(): Pictures {
  const [list, setList] = useState<readonly ShownPicture[]>([]);
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const urls = useRef(new Set<string>());
  useEffect(() => {
    const made = urls.current;
    return () => made.forEach((url) => URL.revokeObjectURL(url));
  }, []);

  const add = async (files: readonly File[]) => {
    setBusy(true);
    setTrouble(null);
    for (const file of files) {
      try {
        const shown = await pictureOf(file);
        urls.current.add(shown.url);
        setList((known) => (known.length < MOST ? [...known, shown] : known));
      } catch (error) {
        setTrouble(error instanceof Error ? error.message : "The photo could not be read.");
      }
    }
    setBusy(false);
  };
  const remove = (id: string) => setList((known) => known.filter((picture) => picture.id !== id));
  return { list, busy, trouble, add, remove, clear: () => setList([]) };
}

async function pictureOf(file: File): Promise<ShownPicture> {
  const bytes = await shrinkPhoto(file);
  const { day } = fieldStore().getSnapshot();
  const position = day?.organisation.keepPhotoPosition ? await positionOf(file) : null;
  const url = URL.createObjectURL(new Blob([bytes], { type: "image/jpeg" }));
  return { id: crypto.randomUUID(), takenAt: new Date().toISOString(), position, bytes, url };
}
