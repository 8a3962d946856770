"use client";

import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { queryKeys } from "@/components/hooks/query-keys";
import { changeMachine, createMachine, deleteMachine, listMachines } from "@/lib/api/client";
import type { Machine } from "@/lib/machines/machine";

export function useMachines(enabled = true) {
  return useQuery({ queryKey: queryKeys.machines, queryFn: listMachines, enabled });
}

/** Makes a machine, or changes the one named. */
export function useSaveMachine(machineId: string | null) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (machine: Machine) => (machineId ? changeMachine(machineId, machine) : createMachine(machine)),
    onSuccess: () => client.invalidateQueries({ queryKey: queryKeys.machines }),
  });
}

export function useDeleteMachine() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: deleteMachine,
    onSuccess: () => client.invalidateQueries({ queryKey: queryKeys.machines }),
  });
}
