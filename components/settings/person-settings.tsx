"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useMutation } from "@tanstack/react-query";
import { useRouter } from "next/navigation";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { Button } from "@/components/ui/button";
import { TextField } from "@/components/ui/form-field";
import { Notice } from "@/components/ui/notice";
import { ContrastChoice, type ContrastName } from "@/components/settings/contrast-choice";
import { OwnUnitChoices } from "@/components/units/own-unit-choices";
import { UnitSwitch } from "@/components/units/unit-switch";
import { describeFailure } from "@/lib/api/api-problem";
import { changeMe, changePassword, signOutEverywhere } from "@/lib/api/client";

const NameShape = z.object({
  name: z.string().trim().min(1, "Say what you are called.").max(120, "At most 120 characters."),
});

/** Name, units and contrast of the person signed in. */
export function PersonSettings({ name, contrast }: { name: string; contrast: ContrastName }) {
  const router = useRouter();
  const form = useForm({ resolver: zodResolver(NameShape), defaultValues: { name } });
  const save = useMutation({ mutationFn: changeMe, onSuccess: () => router.refresh() });
  return (
    <section className="space-y-5">
      <h2 className="text-section">You</h2>
      <form
        noValidate
        className="flex flex-wrap items-end gap-3"
        onSubmit={(event) => void form.handleSubmit((values) => save.mutate(values))(event)}
      >
        <TextField
          label="Name"
          className="w-full max-w-xs"
          autoComplete="name"
          error={form.formState.errors.name?.message}
          {...form.register("name")}
        />
        <Button type="submit" disabled={save.isPending}>
          Save
        </Button>
        <span role="status" className="text-ink-soft">
          {save.isSuccess ? "Saved." : ""}
        </span>
      </form>
      {save.error ? (
        <Notice state="act" urgent>
          {describeFailure(save.error)}
        </Notice>
      ) : null}
      <div className="space-y-1">
        <p className="font-semibold">Units</p>
        <UnitSwitch />
        <p className="text-table text-ink-soft">
          For every number you see, and for tables saved as CSV, which name their units. Exports and the API stay in
          metric (SI).
        </p>
      </div>
      <OwnUnitChoices />
      <ContrastChoice start={contrast} />
    </section>
  );
}

const PasswordShape = z
  .object({
    currentPassword: z.string().min(1, "Enter the password you have now."),
    newPassword: z.string().min(12, "At least 12 characters.").max(200, "At most 200 characters."),
    again: z.string(),
  })
  .refine((values) => values.newPassword === values.again, { path: ["again"], message: "The two are not the same." });

const NO_PASSWORDS = { currentPassword: "", newPassword: "", again: "" };

export function PasswordSettings() {
  const form = useForm({ resolver: zodResolver(PasswordShape), defaultValues: NO_PASSWORDS });
  const save = useMutation({ mutationFn: changePassword, onSuccess: () => form.reset(NO_PASSWORDS) });
  const { errors } = form.formState;
  const submit = form.handleSubmit(({ currentPassword, newPassword }) => save.mutate({ currentPassword, newPassword }));
  return (
    <section className="space-y-5">
      <h2 className="text-section">Password</h2>
      <form noValidate className="max-w-xs space-y-5" onSubmit={(event) => void submit(event)}>
        <TextField
          label="Password now"
          type="password"
          autoComplete="current-password"
          error={errors.currentPassword?.message}
          {...form.register("currentPassword")}
        />
        <TextField
          label="New password"
          type="password"
          autoComplete="new-password"
          hint="At least 12 characters. Every other device is signed out."
          error={errors.newPassword?.message}
          {...form.register("newPassword")}
        />
        <TextField
          label="New password again"
          type="password"
          autoComplete="new-password"
          error={errors.again?.message}
          {...form.register("again")}
        />
        {save.error ? (
          <Notice state="act" urgent>
            {describeFailure(save.error)}
          </Notice>
        ) : null}
        <div className="flex items-center gap-3">
          <Button type="submit" disabled={save.isPending}>
            Change the password
          </Button>
          <span role="status" className="text-ink-soft">
            {save.isSuccess ? "Changed." : ""}
          </span>
        </div>
      </form>
    </section>
  );
}

/** For a cookie that may have been left on a machine of somebody else's. */
export function SessionSettings() {
  const end = useMutation({ mutationFn: signOutEverywhere });
  return (
    <section className="space-y-3">
      <h2 className="text-section">Signed in elsewhere</h2>
      <p className="text-ink-soft">
        Ends every sign-in but this one, on every device, at once. Personal tokens go on; withdraw them below.
      </p>
      {end.error ? (
        <Notice state="act" urgent>
          {describeFailure(end.error)}
        </Notice>
      ) : null}
      <div className="flex items-center gap-3">
        <Button disabled={end.isPending} onClick={() => end.mutate()}>
          Sign out everywhere else
        </Button>
        <span role="status" className="text-ink-soft">
          {end.isSuccess ? "Done. Only this device is signed in." : ""}
        </span>
      </div>
    </section>
  );
}
