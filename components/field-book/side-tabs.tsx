"use client";

import { Tabs } from "radix-ui";
import { useState, type ReactNode } from "react";

export interface SideTab {
  id: string;
  label: string;
  content: ReactNode;
}

/** Ways of comparing what the log holds, one at a time in the same place: by rows, by passes. */
export function SideTabs({ tabs }: { tabs: readonly SideTab[] }) {
  const [chosen, setChosen] = useState(tabs[0]?.id ?? "");
  return (
    <Tabs.Root value={chosen} onValueChange={setChosen} className="flex h-full min-h-0 flex-col">
      <Tabs.List aria-label="Compare by" className="flex gap-1 border-b border-rule px-4">
        {tabs.map(({ id, label }) => (
          <Tabs.Trigger
            key={id}
            value={id}
            className="min-h-11 border-b-2 border-transparent px-2 text-table text-ink-soft hover:text-ink data-[state=active]:border-ink data-[state=active]:font-semibold data-[state=active]:text-ink md:min-h-8"
          >
            {label}
          </Tabs.Trigger>
        ))}
      </Tabs.List>
      {tabs.map(({ id, content }) => (
        // The panels hold things to be focused themselves.
        <Tabs.Content key={id} value={id} tabIndex={-1} className="min-h-0 flex-1 outline-none">
          {content}
        </Tabs.Content>
      ))}
    </Tabs.Root>
  );
}
