"use client";

import { DropdownMenu } from "radix-ui";
import type { ReactNode } from "react";

/** A short list of things to do; the only surface with a shadow. The page behind stays readable to everyone. */
export function Menu({ trigger, children }: { trigger: ReactNode; children: ReactNode }) {
  return (
    <DropdownMenu.Root modal={false}>
      <DropdownMenu.Trigger asChild>{trigger}</DropdownMenu.Trigger>
      <DropdownMenu.Portal>
        <DropdownMenu.Content
          align="end"
          sideOffset={4}
          className="z-50 max-h-[var(--radix-dropdown-menu-content-available-height)] min-w-48 overflow-y-auto rounded border border-rule bg-sheet py-1 shadow-[0_4px_16px_rgb(30_36_48/0.12)]"
        >
          {children}
        </DropdownMenu.Content>
      </DropdownMenu.Portal>
    </DropdownMenu.Root>
  );
}

const ITEM =
  "flex min-h-11 md:min-h-9 cursor-pointer select-none items-center px-4 text-text text-ink no-underline outline-none data-[highlighted]:bg-paper data-[highlighted]:underline";

export function MenuItem({ onSelect, children }: { onSelect: () => void; children: ReactNode }) {
  return (
    <DropdownMenu.Item className={ITEM} onSelect={onSelect}>
      {children}
    </DropdownMenu.Item>
  );
}

export function MenuLink({ href, children, download }: { href: string; children: ReactNode; download?: boolean }) {
  return (
    <DropdownMenu.Item asChild className={ITEM}>
      <a href={href} download={download}>
        {children}
      </a>
    </DropdownMenu.Item>
  );
}

export function MenuNote({ children }: { children: ReactNode }) {
  return <DropdownMenu.Label className="px-4 py-2 text-table text-ink-soft">{children}</DropdownMenu.Label>;
}

/** Entries under a heading that names them to those who hear the menu. */
export function MenuGroup({ title, children }: { title: string; children: ReactNode }) {
  return (
    <DropdownMenu.Group aria-label={title}>
      <MenuNote>{title}</MenuNote>
      {children}
    </DropdownMenu.Group>
  );
}

export function MenuRule() {
  return <DropdownMenu.Separator className="my-1 border-t border-rule" />;
}
