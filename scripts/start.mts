import { serve } from "@/scripts/serve";

await serve("start");
