"use client";

import Image from "next/image";
import type { Pictures } from "./use-pictures";
import { Notice } from "@/components/ui/notice";

/** Photos taken or chosen; each can be taken out again before it is kept. */
export function PhotoField({ pictures }: { pictures: Pictures }) {
  const { list, busy, trouble } = pictures;
  return (
    <div role="group" aria-label="Photos" className="flex flex-col gap-2.5">
      {trouble && <Notice kind="warn">{trouble}</Notice>}
      {list.length > 0 && (
        <ul className="grid grid-cols-3 gap-2">
          {list.map((picture, n) => (
            <li key={picture.id} className="flex flex-col border border-rule bg-sheet">
              <Image
                unoptimized
                src={picture.url}
                alt={`Photo ${n + 1}`}
                width={160}
                height={120}
                className="h-24 w-full object-cover"
              />
              <button
                type="button"
                className="min-h-12 font-semibold"
                aria-label={`Remove photo ${n + 1}`}
                onClick={() => pictures.remove(picture.id)}
              >
                Remove
              </button>
            </li>
          ))}
        </ul>
      )}
      <label className="flex min-h-14 w-full items-center gap-3 rounded border-[1.5px] border-ink bg-sheet px-4 py-3 text-lg font-semibold focus-within:outline-3 focus-within:outline-offset-2 focus-within:outline-dusk active:bg-hair">
        <span className="flex-1">{busy ? "Making it small…" : "Take or choose photos"}</span>
        {list.length > 0 && <span className="font-normal">{list.length}</span>}
        <input
          type="file"
          accept="image/*"
          multiple
          className="sr-only"
          onChange={(event) => {
            const files = [...(event.target.files ?? [])];
            event.target.value = "";
            void pictures.add(files);
          }}
        />
      </label>
    </div>
  );
}
