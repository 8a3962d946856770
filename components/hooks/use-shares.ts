"use client";

import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import type { z } from "zod";
import { queryKeys } from "@/components/hooks/query-keys";
import { createShare, listShares, revokeShare } from "@/lib/api/client";
import type { ShareInput } from "@/lib/schemas/shares";

export function useShares(fieldId: string) {
  return useQuery({ queryKey: queryKeys.shares(fieldId), queryFn: () => listShares(fieldId) });
}

export function useShareActions(fieldId: string) {
  const client = useQueryClient();
  const onSuccess = () => client.invalidateQueries({ queryKey: queryKeys.shares(fieldId) });
  return {
    create: useMutation({ mutationFn: (input: z.input<typeof ShareInput>) => createShare(fieldId, input), onSuccess }),
    revoke: useMutation({ mutationFn: revokeShare, onSuccess }),
  };
}
