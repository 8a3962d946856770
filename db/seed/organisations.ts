import { insertDemoOrganisations, type DemoOrganisation } from "@/db/queries/system/demo-organisations";
import { DEMO_PASSWORD } from "@/lib/access/demo-accounts";
import { hashPassword } from "@/lib/server/access/passwords";

export { DEMO_PASSWORD };

/** Fixed ids, so that seeding again finds what is there. */
export const DEMO_ORGANISATIONS: readonly DemoOrganisation[] = [
  {
    id: "org_larkspurflats",
    slug: "larkspur-flats",
    name: "Larkspur Flats",
    people: [
      { id: "usr_larkspurowner", email: "owner@larkspur.example", name: "Ottilie Brandt", role: "owner" },
      { id: "usr_larkspuragro", email: "agronomist@larkspur.example", name: "Ada Reyes", role: "agronomist" },
      { id: "usr_larkspurresearch", email: "researcher@larkspur.example", name: "Rune Holm", role: "researcher" },
      { id: "usr_larkspuroperator", email: "operator@larkspur.example", name: "Odell Marsh", role: "operator" },
      { id: "usr_larkspurviewer", email: "viewer@larkspur.example", name: "Vera Lindqvist", role: "viewer" },
    ],
  },
  {
    id: "org_otherfarm",
    slug: "otherfarm",
    name: "Otherfarm",
    people: [{ id: "usr_otherfarmowner", email: "owner@otherfarm.example", name: "Omar Fenn", role: "owner" }],
  },
];

/** Makes the demo organisations and their people; what is there already stays as it is. */
export async function seedOrganisations(): Promise<void> {
  await insertDemoOrganisations(DEMO_ORGANISATIONS, await hashPassword(DEMO_PASSWORD));
}
