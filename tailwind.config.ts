import type { Config } from "tailwindcss";

/** The notebook: paper ground, ink text, straw and clay as the two accents, slate for links and focus. */
export default {
  content: ["./app/**/*.{ts,tsx}", "./components/**/*.{ts,tsx}"],
  theme: {
    extend: {
      colors: {
        paper: "#FBFAF6",
        sheet: "#FFFFFF",
        rule: "#E4E0D5",
        /** Outline of something to fill in or press: 3:1 on paper. */
        edge: "#8C8778",
        ink: { DEFAULT: "#1E2430", soft: "#4A5261", faint: "#6B7280" },
        straw: { DEFAULT: "#C29A45", deep: "#7D5A14" },
        clay: "#9A4A2C",
        slate: "#2F5D80",
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
