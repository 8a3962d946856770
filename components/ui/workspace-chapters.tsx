"use client";

import { BookOpen, FileStack, Rows3, Send, Settings, SlidersHorizontal, Tractor, Users } from "lucide-react";
import { useParams } from "next/navigation";
import { ChapterBar, type Chapter } from "@/components/ui/chapter-bar";
import { can, type Role } from "@/lib/access/permissions";

function organisationChapters(root: string, role: Role): Chapter[] {
  const chapters: Chapter[] = [{ href: `${root}/fields`, word: "Fields", icon: BookOpen }];
  if (can(role, "machines.read")) chapters.push({ href: `${root}/machines`, word: "Machines", icon: Tractor });
  if (can(role, "members.read")) chapters.push({ href: `${root}/people`, word: "People", icon: Users });
  chapters.push({ href: `${root}/settings`, word: "Settings", icon: Settings });
  return chapters;
}

/** On the page of one log, its rows are meant. */
function fieldChapters(root: string, role: Role, logId?: string): Chapter[] {
  const chapters: Chapter[] = [
    { href: logId ? `${root}/rows?log=${logId}` : `${root}/rows`, word: "Rows", icon: Rows3 },
    { href: `${root}/logs`, word: "Logs", icon: FileStack },
  ];
  if (can(role, "shares.read")) chapters.push({ href: `${root}/share`, word: "Share", icon: Send });
  if (can(role, "fields.write")) chapters.push({ href: `${root}/settings`, word: "About", icon: SlidersHorizontal });
  return chapters;
}

/** Inside a field its chapters, with the way back to all fields; elsewhere the organisation's pages. */
export function WorkspaceChapters({ slug, role }: { slug: string; role: Role }) {
  const { fieldId, logId } = useParams<{ fieldId?: string; logId?: string }>();
  const pages = organisationChapters(`/${slug}`, role);
  if (!fieldId) return <ChapterBar label="Pages" chapters={pages} />;
  const chapters = fieldChapters(`/${slug}/fields/${fieldId}`, role, logId);
  return <ChapterBar label="Chapters of this field" chapters={chapters} beyond={pages.map(asBeyond)} />;
}

/** Inside a field "Fields" is the way out, not the place one is in. */
function asBeyond(chapter: Chapter): Chapter {
  return chapter.word === "Fields" ? { ...chapter, href: `${chapter.href}?all` } : chapter;
}
