"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useForm, useWatch } from "react-hook-form";
import { z } from "zod";
import { AUDIENCES, expiryAfter, FIRST_LAYERS, LAYER_WORDS, LIVES } from "@/components/sharing/share-words";
import { Button } from "@/components/ui/button";
import { CheckField } from "@/components/ui/check-field";
import { SelectField, TextField } from "@/components/ui/form-field";
import { formatDay } from "@/components/ui/format-date";
import { Notice } from "@/components/ui/notice";
import { StateMark } from "@/components/ui/state-mark";
import { describeFailure } from "@/lib/api/api-problem";
import type { Log } from "@/lib/schemas/logs";
import { SHARE_LAYERS, ShareLayer, type ShareInput } from "@/lib/schemas/shares";

const FormShape = z.object({
  audience: z.enum(["landowner", "adviser", "operator", "public"]),
  layers: z.array(ShareLayer).min(1, "Choose at least one thing to show."),
  logId: z.string(),
  days: z.string(),
  passcode: z.union([z.literal(""), z.string().min(4, "At least 4 characters.").max(64, "At most 64 characters.")]),
  emailTo: z.union([z.literal(""), z.email("Enter an email address, such as name@farm.example.")]),
  blurLocation: z.boolean(),
});
type FormValues = z.infer<typeof FormShape>;
/** What the API is asked for. */
export type ShareWish = z.input<typeof ShareInput>;

/** The form's answers as the API takes them; empty answers are left out. */
export function toShareInput(values: FormValues, now: Date): ShareWish {
  return {
    audience: values.audience,
    layers: values.layers,
    expiresAt: expiryAfter(Number(values.days), now),
    blurLocation: values.blurLocation,
    ...(values.logId ? { logId: values.logId } : {}),
    ...(values.passcode ? { passcode: values.passcode } : {}),
    ...(values.emailTo ? { emailTo: values.emailTo } : {}),
  };
}

export interface NewShareProps {
  logs: Log[];
  landowner: string | null;
  pending: boolean;
  failure: unknown;
  onCreate: (input: ShareWish) => void;
}

/** Who gets to see what, for how long. */
export function NewShare({ logs, landowner, pending, failure, onCreate }: NewShareProps) {
  const ready = logs.filter((log) => log.status === "ready");
  const form = useForm<FormValues>({
    resolver: zodResolver(FormShape),
    defaultValues: {
      audience: "landowner",
      layers: FIRST_LAYERS,
      logId: ready[0]?.id ?? "",
      days: "30",
      passcode: "",
      emailTo: "",
      blurLocation: false,
    },
  });
  const audience = useWatch({ control: form.control, name: "audience" });
  const { errors } = form.formState;
  return (
    <form
      noValidate
      className="sheet max-w-2xl space-y-5 p-4"
      onSubmit={(event) => void form.handleSubmit((values) => onCreate(toShareInput(values, new Date())))(event)}
    >
      <h2 className="text-section">New link</h2>
      <Notice state="look">
        {landowner ? `This land belongs to ${landowner}. ` : ""}On rented land, agree who may see what before sharing it
        with anybody but the landowner. Whoever has the link can pass it on; a passcode, sent another way, keeps it
        closer.
      </Notice>
      <div className="grid gap-5 sm:grid-cols-2">
        <SelectField
          label="For"
          hint={AUDIENCES.find(({ id }) => id === audience)?.hint}
          {...form.register("audience")}
        >
          {AUDIENCES.map(({ id, word }) => (
            <option key={id} value={id}>
              {word}
            </option>
          ))}
        </SelectField>
        <SelectField label="Works for" hint="After that the link shows nothing." {...form.register("days")}>
          {LIVES.map(({ days, word }) => (
            <option key={days} value={days}>
              {word}
            </option>
          ))}
        </SelectField>
        <SelectField
          label="Log"
          hint="A log that comes later never shows through this link."
          {...form.register("logId")}
        >
          {ready.length === 0 ? <option value="">No log is ready yet</option> : null}
          {ready.map((log) => (
            <option key={log.id} value={log.id}>
              {[log.name, formatDay(log.startedAt)].filter((part) => part !== "").join(" · ")}
            </option>
          ))}
        </SelectField>
      </div>
      <fieldset>
        <legend className="font-semibold">Shows</legend>
        <div className="sm:grid sm:grid-cols-2 sm:gap-x-5">
          {SHARE_LAYERS.map((layer) => (
            <CheckField
              key={layer}
              value={layer}
              label={LAYER_WORDS[layer].word}
              hint={LAYER_WORDS[layer].hint}
              {...form.register("layers")}
            />
          ))}
        </div>
        {errors.layers ? (
          <p className="flex items-center gap-2 text-clay">
            <StateMark state="act" />
            {errors.layers.message}
          </p>
        ) : null}
      </fieldset>
      <div className="grid gap-5 sm:grid-cols-2">
        <TextField
          label="Passcode (optional)"
          autoComplete="off"
          hint="Asked before anything is shown."
          error={errors.passcode?.message}
          {...form.register("passcode")}
        />
        <TextField
          label="Send it by email to (optional)"
          type="email"
          autoComplete="off"
          error={errors.emailTo?.message}
          {...form.register("emailTo")}
        />
      </div>
      <CheckField
        label="Leave out where the field lies"
        hint="Shapes and sizes stay true; the place on earth and the maps of the rows are not shown."
        {...form.register("blurLocation")}
      />
      {failure ? (
        <Notice state="act" urgent title="No link was made">
          {describeFailure(failure)}
        </Notice>
      ) : null}
      <Button type="submit" kind="primary" disabled={pending}>
        {pending ? "Making the link…" : "Make the link"}
      </Button>
    </form>
  );
}
