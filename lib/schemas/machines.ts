import { z } from "zod";
import { CombineInput, SeederInput } from "@/lib/machines/machine";
import { Id, Instant, listOf } from "@/lib/schemas/listing";

const stored = { id: Id, createdAt: Instant, updatedAt: Instant };

export const MachineReply = z.discriminatedUnion("kind", [SeederInput.extend(stored), CombineInput.extend(stored)]);
export type MachineReply = z.infer<typeof MachineReply>;
export const MachineList = listOf(MachineReply);

/** Part of a machine; `null` takes an optional value away. The whole is checked again as `MachineInput`. */
export const MachinePatch = z.record(z.string().max(60), z.json());
