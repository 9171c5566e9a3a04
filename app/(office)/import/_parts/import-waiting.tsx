"use client";

import { useQuery } from "@tanstack/react-query";
import { useRouter } from "next/navigation";
import { useEffect } from "react";
import { fetchJson } from "../../_parts/fetch-json";

interface Progress {
  readonly state: string;
  readonly rowsTotal: number | null;
  readonly rowsDone: number;
}

/** Progress of the work; the page shows the outcome by itself when it is done. */
export function ImportWaiting({ importId, state }: { importId: string; state: string }) {
  const router = useRouter();
  const { data } = useQuery({
    queryKey: ["import", importId],
    queryFn: () => fetchJson<Progress>(`/api/v1/imports/${importId}`),
    refetchInterval: 700,
    staleTime: 0,
  });
  const over = data !== undefined && data.state !== state;
  useEffect(() => {
    if (over) router.refresh();
  }, [over, router]);
  const total = data?.rowsTotal ?? 0;
  const words = state === "checking" ? "Looking at the rows" : "Importing";
  return (
    <div role="status" className="mb-5 max-w-3xl border border-rule bg-sheet px-4 py-4">
      <label htmlFor="import-progress" className="font-medium">
        {words}…
      </label>
      <progress
        id="import-progress"
        max={Math.max(1, total)}
        value={total > 0 ? (data?.rowsDone ?? 0) : undefined}
        className="mt-2 block h-3 w-full accent-spruce"
      />
      <p className="mt-2 text-soft">
        {total > 0 ? `${data?.rowsDone ?? 0} of ${total} rows. ` : "Waiting for the worker. "}
        You can leave this page; the work goes on.
      </p>
    </div>
  );
}
