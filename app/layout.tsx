import type { Metadata, Viewport } from "next";
import { connection } from "next/server";
import type { ReactNode } from "react";
import "./globals.css";

export const metadata: Metadata = {
  title: { default: "Wanewright", template: "%s · Wanewright" },
  description: "Swap the right cells on the right day.",
};

export const viewport: Viewport = {
  themeColor: [
    { media: "(prefers-color-scheme: light)", color: "#fdfcf8" },
    { media: "(prefers-color-scheme: dark)", color: "#171d19" },
  ],
};

export default async function RootLayout({ children }: { children: ReactNode }) {
  // Every page is made for its request: scripts carry that response's nonce.
  await connection();
  return (
    <html lang="en-GB">
      <body>{children}</body>
    </html>
  );
}
