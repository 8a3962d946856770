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
  experimental: { proxyClientMaxBodySize: "2gb" },
};

export default config;
