import type { Metadata } from "next";
import { requireScope } from "@/app/_server/require-scope";
import { RecipesPage } from "@/components/recipes/recipes-page";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { can } from "@/lib/access/permissions";

export const metadata: Metadata = { title: "Recipes" };

export default async function RecipesRoute({ params }: { params: Promise<{ org: string }> }) {
  const { org } = await params;
  const { scope } = await requireScope(org, "recipes.read");
  return (
    <PageBody>
      <PageHeading
        title="Recipes"
        lead="What the columns of files mean, as people here confirmed it. A file whose header a recipe knows is read with it."
      />
      <RecipesPage mayWrite={can(scope.role, "recipes.write")} />
    </PageBody>
  );
}
