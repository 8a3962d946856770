"use client";

import { useMutation, useQueryClient } from "@tanstack/react-query";
import type { z } from "zod";
import { queryKeys } from "@/components/hooks/query-keys";
import { usePages } from "@/components/hooks/use-pages";
import { createShare, revokeShare } from "@/lib/api/client";
import { sharePage } from "@/lib/api/list-pages";
import type { ShareInput } from "@/lib/schemas/shares";

export function useSharePages(fieldId: string) {
  return usePages({ queryKey: queryKeys.shares(fieldId), load: sharePage(fieldId) });
}

export function useShareActions(fieldId: string) {
  const client = useQueryClient();
  const onSuccess = () => client.invalidateQueries({ queryKey: queryKeys.shares(fieldId) });
  return {
    create: useMutation({ mutationFn: (input: z.input<typeof ShareInput>) => createShare(fieldId, input), onSuccess }),
    revoke: useMutation({ mutationFn: revokeShare, onSuccess }),
  };
}
