"use client";

import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { type ReactNode, useState } from "react";

const defaults = { queries: { staleTime: 15_000, retry: 1, refetchOnWindowFocus: true } };

/** What lives on the client in the office: lists, boards, live jobs over /api/v1. */
export function QueryProvider({ children }: { children: ReactNode }) {
  const [client] = useState(() => new QueryClient({ defaultOptions: defaults }));
  return <QueryClientProvider client={client}>{children}</QueryClientProvider>;
}
