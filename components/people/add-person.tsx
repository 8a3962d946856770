"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useState } from "react";
import { useForm, useWatch } from "react-hook-form";
import { z } from "zod";
import type { useMemberActions } from "@/components/hooks/use-people";
import { ROLE_WORDS } from "@/components/people/role-words";
import { Button } from "@/components/ui/button";
import { SelectField, TextField } from "@/components/ui/form-field";
import { Notice } from "@/components/ui/notice";
import { ROLES } from "@/lib/access/permissions";
import { ApiProblem, describeFailure } from "@/lib/api/api-problem";

const FormShape = z.object({
  name: z.string().trim().min(1, "Say what they are called.").max(120, "At most 120 characters."),
  email: z.email("Enter an email address, such as name@farm.example."),
  role: z.enum(ROLES),
  password: z.string().min(12, "At least 12 characters.").max(200, "At most 200 characters."),
});
type FormValues = z.infer<typeof FormShape>;

const EMPTY: FormValues = { name: "", email: "", role: "operator", password: "" };

/** Adds a person with a first password, which is told to them outside this program. */
export function AddPerson({ actions }: { actions: ReturnType<typeof useMemberActions> }) {
  const [open, setOpen] = useState(false);
  const [added, setAdded] = useState<string | null>(null);
  const form = useForm<FormValues>({ resolver: zodResolver(FormShape), defaultValues: EMPTY });
  const role = useWatch({ control: form.control, name: "role" });
  const { errors } = form.formState;
  const { add } = actions;
  const refused = add.error instanceof ApiProblem ? add.error : null;
  if (!open) {
    return (
      <div className="flex flex-wrap items-center gap-4">
        <Button kind="primary" onClick={() => setOpen(true)}>
          Add a person
        </Button>
        <p role="status" className="text-ink-soft">
          {added ? `${added} can sign in now. Tell them their first password yourself.` : ""}
        </p>
      </div>
    );
  }
  const submit = form.handleSubmit((values) =>
    add.mutate(values, {
      onSuccess: (member) => {
        setAdded(member.name);
        setOpen(false);
        form.reset(EMPTY);
      },
    }),
  );
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="sheet max-w-2xl space-y-5 p-4">
      <h2 className="text-section">Add a person</h2>
      <div className="grid gap-5 sm:grid-cols-2">
        <TextField label="Name" autoComplete="off" error={errors.name?.message} {...form.register("name")} />
        <TextField
          label="Email"
          type="email"
          autoComplete="off"
          error={errors.email?.message ?? refused?.messageFor("email")}
          {...form.register("email")}
        />
        <SelectField label="Role" hint={`${role}: ${ROLE_WORDS[role]}`} {...form.register("role")}>
          {ROLES.map((name) => (
            <option key={name} value={name}>
              {name}
            </option>
          ))}
        </SelectField>
        <TextField
          label="First password"
          autoComplete="new-password"
          hint="At least 12 characters. They change it under Settings."
          error={errors.password?.message ?? refused?.messageFor("password")}
          {...form.register("password")}
        />
      </div>
      {add.error ? (
        <Notice state="act" urgent title="Not added">
          {describeFailure(add.error)}
        </Notice>
      ) : null}
      <div className="flex flex-wrap gap-2">
        <Button type="submit" kind="primary" disabled={add.isPending}>
          {add.isPending ? "Adding…" : "Add"}
        </Button>
        <Button kind="quiet" onClick={() => setOpen(false)}>
          Not now
        </Button>
      </div>
    </form>
  );
}
