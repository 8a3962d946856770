"use client";

import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import type { z } from "zod";
import { queryKeys } from "@/components/hooks/query-keys";
import {
  addMember,
  changeMember,
  createToken,
  listAudit,
  listMembers,
  listTokens,
  removeMember,
  revokeToken,
} from "@/lib/api/client";
import type { MemberPatch } from "@/lib/schemas/people";

export function useMembers() {
  return useQuery({ queryKey: queryKeys.members, queryFn: listMembers });
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

export function useAudit() {
  return useQuery({ queryKey: queryKeys.audit, queryFn: listAudit });
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
