"use client";

import { useInfiniteQuery, type QueryKey } from "@tanstack/react-query";
import type { LoadPage } from "@/lib/api/list-pages";

/** What a list needs to offer the rest of itself. */
export interface MorePages {
  hasMore: boolean;
  isLoading: boolean;
  load: () => void;
}

interface PagesOptions<Item> {
  queryKey: QueryKey;
  load: LoadPage<Item>;
  /** Milliseconds until what is shown is asked for again; false for not. */
  askAgain?: (items: Item[]) => number | false;
}

/** A list a page at a time: what was loaded so far, in one piece, and how to get more. */
export function usePages<Item>({ queryKey, load, askAgain }: PagesOptions<Item>) {
  const query = useInfiniteQuery({
    // Beside the same list in one piece, and forgotten together with it.
    queryKey: [...queryKey, "pages"],
    queryFn: ({ pageParam }) => load(pageParam),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    refetchInterval: ({ state }) => askAgain?.(state.data?.pages.flatMap((page) => page.items) ?? []) ?? false,
  });
  const more: MorePages = {
    hasMore: query.hasNextPage,
    isLoading: query.isFetchingNextPage,
    load: () => void query.fetchNextPage(),
  };
  return {
    items: query.data?.pages.flatMap((page) => page.items),
    error: query.error,
    isPending: query.isPending,
    more,
  };
}
