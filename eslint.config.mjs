import { defineConfig, globalIgnores } from "eslint/config";
import nextVitals from "eslint-config-next/core-web-vitals";
import nextTs from "eslint-config-next/typescript";

export default defineConfig([
  ...nextVitals,
  ...nextTs,
  globalIgnores([".next/**", "build/**", ".data/**", "next-env.d.ts", "public/**", "fixtures/**"]),
  {
    rules: {
      "@typescript-eslint/no-explicit-any": "error",
      "@typescript-eslint/no-unused-vars": ["error", { argsIgnorePattern: "^_" }],
      "@typescript-eslint/ban-ts-comment": "error",
      "no-console": ["error", { allow: ["error", "warn"] }],
    },
  },
  { files: ["scripts/**", "tests/**", "lib/server/**", "db/seed/**"], rules: { "no-console": "off" } },
]);
