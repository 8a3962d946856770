"use client";

import { useState } from "react";
import type { RecipeActions } from "@/components/recipes/use-recipes";
import { Button } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { TextField } from "@/components/ui/form-field";
import { describeFailure } from "@/lib/api/api-problem";
import type { Recipe } from "@/lib/schemas/recipes";

/** Gives a recipe another name; logs that were read with it name it by the new one. */
export function RenameRecipe({ recipe, actions }: { recipe: Recipe; actions: RecipeActions }) {
  const [open, setOpen] = useState(false);
  const [name, setName] = useState(recipe.name);
  const { change } = actions;
  const trimmed = name.trim();
  return (
    <>
      <Button
        kind="quiet"
        aria-label={`Rename ${recipe.name}`}
        onClick={() => {
          change.reset();
          setName(recipe.name);
          setOpen(true);
        }}
      >
        Rename
      </Button>
      <Dialog title={`Rename ${recipe.name}`} open={open} onOpenChange={setOpen}>
        <form
          noValidate
          className="space-y-4"
          onSubmit={(event) => {
            event.preventDefault();
            change.mutate({ id: recipe.id, patch: { name: trimmed } }, { onSuccess: () => setOpen(false) });
          }}
        >
          <TextField
            label="Name"
            value={name}
            maxLength={120}
            error={change.error ? describeFailure(change.error) : undefined}
            onChange={(event) => setName(event.target.value)}
          />
          <Button type="submit" kind="primary" disabled={trimmed === "" || trimmed === recipe.name || change.isPending}>
            Rename
          </Button>
        </form>
      </Dialog>
    </>
  );
}
