"use client";

import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { useState, type ReactNode } from "react";
import { ApiProblem } from "@/lib/api/api-problem";

/** A refusal (4xx) will be refused again; only a broken connection or a 5xx is worth a second try. */
function shouldRetry(failures: number, error: Error): boolean {
  if (error instanceof ApiProblem && error.status < 500) return false;
  return failures < 2;
}

export function QueryProvider({ children }: { children: ReactNode }) {
  const [client] = useState(
    () => new QueryClient({ defaultOptions: { queries: { staleTime: 5_000, retry: shouldRetry } } }),
  );
  return <QueryClientProvider client={client}>{children}</QueryClientProvider>;
}
