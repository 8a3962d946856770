import { adminDb } from "@/db/client";
import { memberships, organisations, users } from "@/db/schema";
import type { Role } from "@/lib/access/permissions";

export interface DemoPerson {
  id: string;
  email: string;
  name: string;
  role: Role;
}

export interface DemoOrganisation {
  id: string;
  slug: string;
  name: string;
  people: readonly DemoPerson[];
}

/** Makes the organisations with their people in one transaction; what is there already stays as it is. */
export async function insertDemoOrganisations(demo: readonly DemoOrganisation[], passwordHash: string): Promise<void> {
  await adminDb().transaction(async (tx) => {
    for (const { people, ...organisation } of demo) {
      const organisationId = organisation.id;
      await tx
        .insert(organisations)
        .values({ ...organisation, isDemo: "yes" })
        .onConflictDoNothing();
      for (const { role, ...person } of people) {
        await tx
          .insert(users)
          .values({ ...person, passwordHash })
          .onConflictDoNothing();
        const id = person.id.replace("usr_", "mem_");
        await tx.insert(memberships).values({ organisationId, id, userId: person.id, role }).onConflictDoNothing();
      }
    }
  });
}
