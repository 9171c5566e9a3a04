import type { MetadataRoute } from "next";

/** Makes the phone pages installable: they start from an icon, on Today. */
export default function manifest(): MetadataRoute.Manifest {
  return {
    name: "Wanewright",
    short_name: "Wanewright",
    description: "The day’s round, voltages and swaps, with or without signal.",
    id: "/today",
    start_url: "/today",
    scope: "/",
    display: "standalone",
    background_color: "#f6f3ea",
    theme_color: "#17211d",
    icons: [
      { src: "/icons/wanewright-192.png", sizes: "192x192", type: "image/png" },
      { src: "/icons/wanewright-512.png", sizes: "512x512", type: "image/png" },
      {
        src: "/icons/wanewright-maskable-512.png",
        sizes: "512x512",
        type: "image/png",
        purpose: "maskable",
      },
    ],
  };
}
