/** @type {import("next").NextConfig} */
const config = {
  poweredByHeader: false,
  reactStrictMode: true,
  serverExternalPackages: [
    "@node-rs/argon2",
    "sharp",
    "pg",
    "pg-boss",
    "pg-copy-streams",
    "nodemailer",
    "node-sqlite3-wasm",
    "apache-arrow",
  ],
  // authInterrupts: `forbidden()` and `unauthorized()`, so that a page refused to a role answers 403.
  experimental: { proxyClientMaxBodySize: "2gb", authInterrupts: true },
};

export default config;
