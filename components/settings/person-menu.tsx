"use client";

import { UserRound } from "lucide-react";
import { signOut } from "next-auth/react";
import { buttonClass } from "@/components/ui/button";
import { Menu, MenuItem, MenuLink, MenuNote, MenuRule } from "@/components/ui/menu";
import { useUnits } from "@/components/units/use-units";
import type { Role } from "@/lib/access/permissions";

export interface Person {
  name: string;
  email: string;
  role: Role;
}

export function PersonMenu({ person, slug }: { person: Person; slug: string }) {
  const { systemName, setSystem } = useUnits();
  const other = systemName === "metric" ? "imperial" : "metric";
  return (
    <Menu
      trigger={
        <button
          type="button"
          className={buttonClass("quiet", "-mr-2 max-md:px-3")}
          aria-label={`Signed in as ${person.name}`}
        >
          <UserRound size={20} strokeWidth={1.5} aria-hidden />
        </button>
      }
    >
      <MenuNote>
        <span className="block font-semibold text-ink">{person.name}</span>
        {person.email} · {person.role}
      </MenuNote>
      <MenuRule />
      <MenuItem onSelect={() => setSystem(other)}>
        {other === "metric" ? "Show metric units" : "Show US units"}
      </MenuItem>
      <MenuLink href={`/${slug}/settings`}>Settings</MenuLink>
      <MenuLink href="/docs/api">API reference</MenuLink>
      <MenuRule />
      <MenuItem onSelect={() => void signOut({ callbackUrl: "/" })}>Sign out</MenuItem>
    </Menu>
  );
}
