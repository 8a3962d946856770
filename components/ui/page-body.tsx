import type { ReactNode } from "react";

/** The margins of an ordinary page. Pages with a map fill the frame themselves. */
export function PageBody({ children }: { children: ReactNode }) {
  return <div className="mx-auto max-w-6xl space-y-6 px-4 py-6 md:px-8">{children}</div>;
}
