import { buildIfStale } from "@/scripts/build-if-stale";

await buildIfStale();
