import { z } from "zod";
import { reply } from "@/app/_server/reply";
import { withPublic } from "@/app/_server/with-scope";

const Health = z.object({ status: z.literal("up") });

/** The process answers; nothing else is asked. */
export const GET = withPublic(async () => reply(Health, { status: "up" }));
