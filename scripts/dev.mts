import { serve } from "@/scripts/serve";

await serve("dev");
