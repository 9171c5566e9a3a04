import type { ReactNode } from "react";
import { BrandDisc } from "@/components/ui/brand-disc";

export default function EntryLayout({ children }: { children: ReactNode }) {
  return (
    <main
      id="main"
      className="mx-auto flex min-h-dvh w-full max-w-104 flex-col px-4 py-6 sm:justify-center sm:py-12"
    >
      <p className="mb-5 flex items-center gap-2.5 font-serif text-xl font-semibold tracking-tight">
        <BrandDisc />
        Wanewright
      </p>
      {children}
    </main>
  );
}
