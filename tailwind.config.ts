import type { Config } from "tailwindcss";

/**
 * The notebook: paper ground, ink text, straw and clay as the two accents, slate for links and focus.
 * The values stand in app/globals.css, once as they are and once for high contrast.
 */
export default {
  content: ["./app/**/*.{ts,tsx}", "./components/**/*.{ts,tsx}"],
  theme: {
    extend: {
      colors: {
        paper: "var(--paper)",
        sheet: "var(--sheet)",
        rule: "var(--rule)",
        /** Outline of something to fill in or press: 3:1 on paper. */
        edge: "var(--edge)",
        ink: { DEFAULT: "var(--ink)", soft: "var(--ink-soft)", faint: "var(--ink-faint)" },
        straw: { DEFAULT: "var(--straw)", deep: "var(--straw-deep)" },
        clay: "var(--clay)",
        slate: "var(--slate)",
      },
      fontFamily: { sans: ['"Roboto Flex"', '"Roboto Flex Variable"', "system-ui", "sans-serif"] },
      fontSize: {
        table: ["13px", "18px"],
        text: ["15px", "22px"],
        section: ["18px", "24px"],
        page: ["24px", "30px"],
        number: ["34px", "38px"],
      },
      borderRadius: { DEFAULT: "3px" },
      transitionDuration: { DEFAULT: "120ms" },
    },
  },
} satisfies Config;
