"use client";

import { useEffect, useSyncExternalStore } from "react";

export interface Toast {
  text: string;
  /** Offered for as long as the toast stands. */
  undo?: () => void;
  /** Milliseconds; with an undo it stays three times as long. */
  standsFor?: number;
}

type Shown = Toast & { id: number };

let shown: readonly Shown[] = [];
let lastId = 0;
const nothing: readonly Shown[] = [];
const listeners = new Set<() => void>();

function replace(next: readonly Shown[]) {
  shown = next;
  for (const listener of listeners) listener();
}

function subscribe(listener: () => void) {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

/** Says that something was done, from anywhere in the browser. */
export function toast(message: Toast) {
  lastId += 1;
  replace([...shown, { ...message, id: lastId }]);
}

function dismiss(id: number) {
  replace(shown.filter((entry) => entry.id !== id));
}

/** Where toasts appear; one to a layout. It is read out politely. */
export function ToastRegion() {
  const entries = useSyncExternalStore(
    subscribe,
    () => shown,
    () => nothing,
  );
  return (
    <div
      role="status"
      className="pointer-events-none fixed inset-x-4 bottom-4 z-20 mx-auto flex max-w-md flex-col gap-2 no-print"
    >
      {entries.map((entry) => (
        <ToastLine key={entry.id} entry={entry} />
      ))}
    </div>
  );
}

function ToastLine({ entry }: { entry: Shown }) {
  useEffect(() => {
    const stands = entry.standsFor ?? (entry.undo ? 15_000 : 5_000);
    const timer = setTimeout(() => dismiss(entry.id), stands);
    return () => clearTimeout(timer);
  }, [entry]);
  const act = () => {
    entry.undo?.();
    dismiss(entry.id);
  };
  return (
    <div className="pointer-events-auto flex items-center gap-3 rounded bg-bar px-4 py-2.5 text-on-bar">
      <span className="flex-1">{entry.text}</span>
      {entry.undo && (
        <button type="button" onClick={act} className="min-h-8 font-medium underline">
          Undo
        </button>
      )}
      <button
        type="button"
        aria-label="Close"
        onClick={() => dismiss(entry.id)}
        className="size-8 rounded text-lg leading-none"
      >
        ×
      </button>
    </div>
  );
}
