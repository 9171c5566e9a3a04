import type { Config } from "tailwindcss";

/**
 * The almanac's vocabulary for Tailwind. Every colour is a token of app/globals.css, so a class
 * works by day, by night and on the phone alike; the default palette is left out on purpose.
 */
const tokens = [
  "paper",
  "sheet",
  "ink",
  "soft",
  "rule",
  "hair",
  "picked",
  "spruce",
  "spruce-ink",
  "spruce-line",
  "spruce-tint",
  "on-spruce",
  "honey",
  "honey-ink",
  "honey-line",
  "honey-tint",
  "brick",
  "brick-ink",
  "brick-line",
  "brick-tint",
  "on-brick",
  "dusk",
  "dusk-ink",
  "dusk-line",
  "dusk-tint",
  "on-dusk",
  "bar",
  "on-bar",
  "land",
  "water",
] as const;

const config: Config = {
  content: ["./app/**/*.{ts,tsx}", "./components/**/*.{ts,tsx}"],
  theme: {
    colors: {
      transparent: "transparent",
      current: "currentColor",
      ...Object.fromEntries(tokens.map((token) => [token, `var(--${token})`])),
    },
    borderRadius: { none: "0", DEFAULT: "3px", full: "9999px" },
    boxShadow: { none: "none" },
    fontFamily: {
      sans: ['"Roboto Variable"', "system-ui", "sans-serif"],
      cond: ['"Roboto Condensed Variable"', '"Roboto Variable"', "sans-serif"],
      mono: ['"Roboto Mono Variable"', "ui-monospace", "monospace"],
      serif: ['"Roboto Serif Variable"', "Georgia", "serif"],
    },
    fontSize: {
      "2xs": ["0.6875rem", "1rem"],
      xs: ["0.78125rem", "1rem"],
      sm: ["0.8125rem", "1.125rem"],
      base: ["0.875rem", "1.25rem"],
      md: ["1rem", "1.5rem"],
      lg: ["1.125rem", "1.5rem"],
      xl: ["1.3125rem", "1.75rem"],
      "2xl": ["1.5rem", "1.875rem"],
      "3xl": ["1.875rem", "2.125rem"],
      "4xl": ["2.5rem", "2.75rem"],
      "6xl": ["4rem", "4.5rem"],
    },
  },
};

export default config;
