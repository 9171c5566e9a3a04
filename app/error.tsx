"use client";

import { BigButton } from "@/components/ui/big-button";
import { ErrorPanel } from "@/components/ui/states";

export interface FailureProps {
  error: Error & { digest?: string };
  reset: () => void;
}

export default function Failure({ error, reset }: FailureProps) {
  return (
    <main id="main" className="page mx-auto max-w-2xl">
      <h1 className="sr-only">Something went wrong</h1>
      <ErrorPanel
        title="This page could not be made."
        kept="Everything that was saved before is safe."
        todo="Try again. If it stays so, tell your administrator the reference."
        {...(error.digest && { reference: error.digest })}
        action={<BigButton onClick={reset}>Try again</BigButton>}
      />
    </main>
  );
}
