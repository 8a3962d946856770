"use client";

import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import type { z } from "zod";
import { queryKeys } from "@/components/hooks/query-keys";
import { usePages } from "@/components/hooks/use-pages";
import { addMember, changeMember, createToken, listTokens, removeMember, revokeToken } from "@/lib/api/client";
import { auditPage, memberPage } from "@/lib/api/list-pages";
import type { MemberPatch } from "@/lib/schemas/people";

export function useMemberPages() {
  return usePages({ queryKey: queryKeys.members, load: memberPage });
}

export function useMemberActions() {
  const client = useQueryClient();
  const onSuccess = () => client.invalidateQueries({ queryKey: queryKeys.members });
  return {
    add: useMutation({ mutationFn: addMember, onSuccess }),
    change: useMutation({
      mutationFn: ({ memberId, patch }: { memberId: string; patch: z.input<typeof MemberPatch> }) =>
        changeMember(memberId, patch),
      onSuccess,
    }),
    remove: useMutation({ mutationFn: removeMember, onSuccess }),
  };
}

export function useAuditPages() {
  return usePages({ queryKey: queryKeys.audit, load: auditPage });
}

export function useTokens() {
  return useQuery({ queryKey: queryKeys.tokens, queryFn: listTokens });
}

export function useTokenActions() {
  const client = useQueryClient();
  const onSuccess = () => client.invalidateQueries({ queryKey: queryKeys.tokens });
  return {
    create: useMutation({ mutationFn: createToken, onSuccess }),
    revoke: useMutation({ mutationFn: revokeToken, onSuccess }),
  };
}
