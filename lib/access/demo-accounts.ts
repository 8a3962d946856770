import type { Role } from "@/lib/access/permissions";

/** One password for every demo account. Shown on screens in demo mode only; the seed uses the same. */
export const DEMO_PASSWORD = "barley-into-stubble";

export interface DemoAccount {
  email: string;
  name: string;
  role: Role;
  organisation: "larkspur" | "otherfarm";
  /** What one would sign in as this person to do. */
  does: string;
}

/** Everyone in the invented demo organisations. */
export const DEMO_ACCOUNTS: readonly DemoAccount[] = [
  {
    email: "operator@larkspur.example",
    name: "Odell Marsh",
    role: "operator",
    organisation: "larkspur",
    does: "takes in a log after a pass and reads its verdict",
  },
  {
    email: "agronomist@larkspur.example",
    name: "Ada Reyes",
    role: "agronomist",
    organisation: "larkspur",
    does: "sets up fields, machines and shares",
  },
  {
    email: "researcher@larkspur.example",
    name: "Rune Holm",
    role: "researcher",
    organisation: "larkspur",
    does: "reads every log, changes nothing",
  },
  {
    email: "viewer@larkspur.example",
    name: "Vera Lindqvist",
    role: "viewer",
    organisation: "larkspur",
    does: "reads the fields given to her",
  },
  {
    email: "owner@larkspur.example",
    name: "Ottilie Brandt",
    role: "owner",
    organisation: "larkspur",
    does: "runs the organisation: people, shares, audit",
  },
  {
    email: "owner@otherfarm.example",
    name: "Omar Fenn",
    role: "owner",
    organisation: "otherfarm",
    does: "owns another farm and sees none of this one",
  },
];
