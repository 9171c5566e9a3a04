import type { Metadata } from "next";
import { FieldApp } from "../_parts/field-app";

export const metadata: Metadata = { title: "Kept on this phone" };

/** One shell for all phone pages; the screen follows the address, with or without signal. */
export default function Page() {
  return <FieldApp />;
}
