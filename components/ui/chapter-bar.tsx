"use client";

import { usePathname } from "next/navigation";
import type { ComponentType } from "react";
import { classNames } from "@/components/ui/class-names";
import { QuietLink } from "@/components/ui/quiet-link";

export interface Chapter {
  href: string;
  word: string;
  icon: ComponentType<{ size?: number; strokeWidth?: number; "aria-hidden"?: boolean }>;
}

export interface ChapterBarProps {
  label: string;
  /** The open book's chapters; on a phone these fill the bottom bar. */
  chapters: Chapter[];
  /** Pages beyond the open book, under a hairline on the left edge; not on the phone's bar. */
  beyond?: Chapter[];
}

/** The left edge on a wide screen, the bottom bar on a phone. */
export function ChapterBar({ label, chapters, beyond = [] }: ChapterBarProps) {
  const path = usePathname();
  return (
    <nav
      aria-label={label}
      className="no-print fixed inset-x-0 bottom-0 z-30 border-t border-rule bg-paper pb-[env(safe-area-inset-bottom)] md:bottom-0 md:left-0 md:right-auto md:top-14 md:w-[5.5rem] md:border-r md:border-t-0 md:pt-2"
    >
      <ul className="flex justify-around md:flex-col md:items-stretch md:justify-start">
        {chapters.map((chapter) => (
          <ChapterLink key={chapter.href} chapter={chapter} current={isCurrent(path, chapter.href)} />
        ))}
      </ul>
      {beyond.length > 0 ? (
        <ul className="mx-3 mt-3 hidden border-t border-rule pt-3 md:-mx-0 md:block">
          {beyond.map((chapter) => (
            <ChapterLink key={chapter.href} chapter={chapter} current={isCurrent(path, chapter.href)} />
          ))}
        </ul>
      ) : null}
    </nav>
  );
}

function isCurrent(path: string, href: string): boolean {
  return path === href || path.startsWith(`${href}/`);
}

function ChapterLink({ chapter, current }: { chapter: Chapter; current: boolean }) {
  const Icon = chapter.icon;
  return (
    <li className="flex-1 md:flex-none">
      <QuietLink
        href={chapter.href}
        aria-current={current ? "page" : undefined}
        className={classNames(
          "flex min-h-14 flex-col items-center justify-center gap-0.5 border-t-2 text-table no-underline -outline-offset-2 md:border-l-2 md:border-t-0",
          current ? "border-ink font-semibold text-ink" : "border-transparent text-ink-soft hover:text-ink",
        )}
      >
        <Icon size={20} strokeWidth={1.5} aria-hidden />
        {chapter.word}
      </QuietLink>
    </li>
  );
}
