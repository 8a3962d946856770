"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import Link from "next/link";
import { useRouter } from "next/navigation";
import { FormProvider, useForm, useWatch, type Resolver } from "react-hook-form";
import { useSaveMachine } from "@/components/hooks/use-machines";
import { CombineFields } from "@/components/machines/combine-fields";
import { machineParseOptions } from "@/components/machines/machine-words";
import { sensibleMachine } from "@/components/machines/machine-sense";
import { SeederFields } from "@/components/machines/seeder-fields";
import { ToolbarDrawing, type DraftMachine } from "@/components/machines/toolbar-drawing";
import { Button, buttonClass } from "@/components/ui/button";
import { TextField } from "@/components/ui/form-field";
import { Notice } from "@/components/ui/notice";
import { useUnits } from "@/components/units/use-units";
import { describeFailure } from "@/lib/api/api-problem";
import type { Machine } from "@/lib/machines/machine";

export interface MachineFormProps {
  slug: string;
  /** Null for a new machine. */
  machineId: string | null;
  start: DraftMachine;
  /** Where to go on once saved, with `?machine=` naming it; the list of machines when left out. */
  returnTo?: string;
  /** False: to look at only. */
  mayWrite?: boolean;
}

/** A machine being described: in SI underneath, in the person's units on the page, drawn as it is typed. */
export function MachineForm({ slug, machineId, start, returnTo, mayWrite = true }: MachineFormProps) {
  const router = useRouter();
  const save = useSaveMachine(machineId);
  const { system } = useUnits();
  const form = useForm<DraftMachine, unknown, Machine>({
    // The draft may be half empty; the resolver's outcome is a whole machine.
    resolver: zodResolver(sensibleMachine(system), machineParseOptions) as unknown as Resolver<
      DraftMachine,
      unknown,
      Machine
    >,
    defaultValues: start,
  });
  const draft = useWatch({ control: form.control });
  const nameError = form.formState.errors["name"]?.message;
  const submit = form.handleSubmit((machine) =>
    save.mutate(machine, {
      onSuccess: ({ id }) => router.push(returnTo === undefined ? `/${slug}/machines` : `${returnTo}?machine=${id}`),
    }),
  );
  return (
    <FormProvider {...form}>
      <form noValidate onSubmit={(event) => void submit(event)} className="grid gap-8 lg:grid-cols-[1fr_24rem]">
        <fieldset disabled={!mayWrite} className="min-w-0 max-w-2xl space-y-8 max-lg:order-2">
          {mayWrite ? null : <Notice state="none">Your role may look at this machine, not change it.</Notice>}
          <TextField
            label="Name"
            hint="As the farm calls it, such as 24-row drill."
            error={typeof nameError === "string" ? nameError : undefined}
            {...form.register("name")}
          />
          {start.kind === "seeder" ? <SeederFields /> : <CombineFields />}
          {save.error ? (
            <Notice state="act" urgent title="Not saved">
              {describeFailure(save.error)}
            </Notice>
          ) : null}
          {Object.keys(form.formState.errors).length > 0 ? (
            <Notice state="act" urgent>
              Some answers need another look; each says what is wrong.
            </Notice>
          ) : null}
          <div className="flex flex-wrap gap-2">
            {mayWrite ? (
              <Button type="submit" kind="primary" disabled={save.isPending || save.isSuccess}>
                {save.isPending ? "Saving…" : "Save the machine"}
              </Button>
            ) : null}
            <Link href={returnTo ?? `/${slug}/machines`} className={buttonClass("quiet")}>
              {returnTo === undefined ? "Back to machines" : "Back to the log"}
            </Link>
          </div>
          {machineId && mayWrite ? (
            <p className="text-table text-ink-soft">
              Logs already read keep the machine as it was. Read a log again to place its rows anew.
            </p>
          ) : null}
        </fieldset>
        <aside className="max-lg:order-1">
          <div className="sheet p-3 lg:sticky lg:top-20">
            <ToolbarDrawing
              machine={{ ...draft, kind: start.kind }}
              label="The machine from above, travelling up the page"
            />
            <p className="px-1 pb-1 text-table text-ink-soft">From above, travelling up the page; row 1 is leftmost.</p>
          </div>
        </aside>
      </form>
    </FormProvider>
  );
}
