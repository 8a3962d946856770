"use client";

import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { queryKeys } from "@/components/hooks/query-keys";
import { usePages } from "@/components/hooks/use-pages";
import { useRemove } from "@/components/removals/use-removals";
import { changeMachine, createMachine, deleteMachine } from "@/lib/api/client";
import { listAll, machinePage } from "@/lib/api/list-pages";
import type { Machine } from "@/lib/machines/machine";

export function useMachines(enabled = true) {
  return useQuery({ queryKey: queryKeys.machines, queryFn: () => listAll(machinePage), enabled });
}

/** The same a page at a time, for looking at them. */
export function useMachinePages() {
  return usePages({ queryKey: queryKeys.machines, load: machinePage });
}

/** The optional values a form has emptied must be taken away, not left as they were. */
function asPatch(machine: Machine): Record<string, unknown> {
  const optional = machine.kind === "seeder" ? OPTIONAL_SEEDER : OPTIONAL_COMBINE;
  return { ...Object.fromEntries(optional.map((key) => [key, null])), ...machine };
}

const OPTIONAL_SEEDER = [
  "rowOffsetsM",
  "rowForwardM",
  "sections",
  "wings",
  "antennaToHitchM",
  "hitchToRowsM",
  "maxDownforceN",
  "targetMarginN",
  "marginDeadbandN",
  "frame",
];
const OPTIONAL_COMBINE = ["headerRows", "spreadWidthM"];

/** Makes a machine, or changes the one named. */
export function useSaveMachine(machineId: string | null) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (machine: Machine) => (machineId ? changeMachine(machineId, asPatch(machine)) : createMachine(machine)),
    onSuccess: () => client.invalidateQueries({ queryKey: queryKeys.machines }),
  });
}

/** Takes a machine away after a time for calling it off. */
export function useDeleteMachine() {
  const remove = useRemove();
  return ({ id, name }: { id: string; name: string }) =>
    remove({ id, name, remove: () => deleteMachine(id), lists: [{ queryKey: queryKeys.machines }] });
}
