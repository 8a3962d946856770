// Brings the database of DATABASE_ADMIN_URL up to date; run once before anything else starts.
import { migrateDatabase } from "@/db/migrate";

const url = process.env.DATABASE_ADMIN_URL;
if (!url) throw new Error("DATABASE_ADMIN_URL is not set");
await migrateDatabase(url);
