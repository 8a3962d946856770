"use client";

import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { requestJson } from "@/lib/api/request-json";
import type { z } from "zod";
import { LegendList, type Legend, type LegendInput } from "@/lib/schemas/legends";

const PATH = "/api/v1/legends";
const KEY = ["legends"] as const;

/** Class edges that the organisation keeps for a channel, in the unit that this log has it in. */
export function useOurLegend(channel: string, unit: string): Legend | null {
  const { data } = useLegends();
  return data?.items.find((legend) => legend.channel === channel && legend.unit === unit) ?? null;
}

/** All of them, and whether the person may change them. */
export function useLegends() {
  return useQuery({ queryKey: KEY, queryFn: () => requestJson(LegendList, PATH), staleTime: 60_000 });
}

/** Keeps the edges of a channel for everyone, or with null gives them up. */
export function useChangeLegend() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: z.input<typeof LegendInput>) => requestJson(LegendList, PATH, { method: "PUT", body }),
    onSuccess: (list) => client.setQueryData(KEY, list),
  });
}
