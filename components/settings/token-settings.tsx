"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import Link from "next/link";
import { useMemo, useState } from "react";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { useTokenActions, useTokens } from "@/components/hooks/use-people";
import { Button } from "@/components/ui/button";
import { CopyText } from "@/components/ui/copy-text";
import { DataTable, type DataColumn } from "@/components/ui/data-table";
import { ConfirmDialog } from "@/components/ui/dialog";
import { SelectField, TextField } from "@/components/ui/form-field";
import { formatDay, formatMoment } from "@/components/ui/format-date";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import { ROLES, type Role } from "@/lib/access/permissions";
import { describeFailure } from "@/lib/api/api-problem";
import type { TokenList } from "@/lib/schemas/people";

type TokenBody = z.infer<typeof TokenList>["items"][number];

const DAY_MS = 86_400_000;
const LIVES: [days: string, words: string][] = [
  ["30", "30 days"],
  ["180", "half a year"],
  ["365", "one year"],
  ["", "until revoked"],
];

/** The moment so many days from now; undefined for no end. */
function expiryIn(days: string): string | undefined {
  return days ? new Date(Date.now() + Number(days) * DAY_MS).toISOString() : undefined;
}

const FormShape = z.object({
  name: z.string().trim().min(1, "Name it after what will use it.").max(120, "At most 120 characters."),
  role: z.enum(ROLES),
  days: z.string(),
});

/** Personal tokens for scripts: made, shown once, taken back. */
export function TokenSettings({ role }: { role: Role }) {
  const tokens = useTokens();
  const actions = useTokenActions();
  const [shown, setShown] = useState<string | null>(null);
  const form = useForm({ resolver: zodResolver(FormShape), defaultValues: { name: "", role, days: "180" } });
  // A token may be at most what its owner is; roles are ordered from most to least trusted.
  const roles = ROLES.slice(ROLES.indexOf(role));
  const submit = form.handleSubmit(({ name, role: chosen, days }) => {
    const expiresAt = expiryIn(days);
    actions.create.mutate(
      { name, role: chosen, expiresAt },
      {
        onSuccess: (created) => {
          setShown(created.token);
          form.reset();
        },
      },
    );
  });
  return (
    <section className="space-y-5">
      <div className="space-y-1">
        <h2 className="text-section">Personal tokens</h2>
        <p className="text-ink-soft">
          For your own scripts in R, Python or curl. See the <Link href="/docs/api">API reference</Link>.
        </p>
      </div>
      <form
        noValidate
        className="grid items-start gap-5 sm:grid-cols-[1fr_auto_auto_auto]"
        onSubmit={(event) => void submit(event)}
      >
        <TextField
          label="Name"
          hint="Such as yield script."
          error={form.formState.errors.name?.message}
          {...form.register("name")}
        />
        <SelectField label="May do as" {...form.register("role")}>
          {roles.map((name) => (
            <option key={name} value={name}>
              {name}
            </option>
          ))}
        </SelectField>
        <SelectField label="Works for" {...form.register("days")}>
          {LIVES.map(([days, words]) => (
            <option key={words} value={days}>
              {words}
            </option>
          ))}
        </SelectField>
        <Button type="submit" className="sm:mt-[26px]" disabled={actions.create.isPending}>
          Make a token
        </Button>
      </form>
      {actions.create.error ? (
        <Notice state="act" urgent>
          {describeFailure(actions.create.error)}
        </Notice>
      ) : null}
      {shown ? (
        <Notice state="look" urgent title="Copy it now: it is shown this once">
          <CopyText text={shown} label="The new token" />
        </Notice>
      ) : null}
      {tokens.isPending ? <Loading what="your tokens" /> : null}
      {tokens.isError ? <Notice state="act">{describeFailure(tokens.error)}</Notice> : null}
      {tokens.data && tokens.data.items.length > 0 ? (
        <TokenTable tokens={tokens.data.items} onRevoke={(id) => actions.revoke.mutate(id)} />
      ) : null}
    </section>
  );
}

function TokenTable({ tokens, onRevoke }: { tokens: TokenBody[]; onRevoke: (tokenId: string) => void }) {
  const columns = useMemo<DataColumn<TokenBody>[]>(
    () => [
      { id: "name", header: "Token", value: (token) => token.name },
      { id: "role", header: "Role", value: (token) => token.role },
      { id: "made", header: "Made", value: (token) => token.createdAt, cell: (token) => formatDay(token.createdAt) },
      {
        id: "used",
        header: "Last used",
        value: (token) => token.lastUsedAt ?? undefined,
        cell: (token) => formatMoment(token.lastUsedAt) || "never",
      },
      {
        id: "ends",
        header: "Ends",
        value: (token) => token.expiresAt ?? undefined,
        cell: (token) => formatDay(token.expiresAt) || "when revoked",
      },
    ],
    [],
  );
  return (
    <DataTable
      caption="Your tokens"
      rows={tokens}
      columns={columns}
      rowId={(token) => token.id}
      fileName="tokens"
      actions={(token) => (
        <ConfirmDialog
          trigger={<Button kind="quiet">Revoke</Button>}
          title={`Revoke ${token.name}?`}
          confirmWords="Revoke"
          onConfirm={() => onRevoke(token.id)}
        >
          <p>Whatever uses it stops working at once. This cannot be taken back; you can make a new one.</p>
        </ConfirmDialog>
      )}
    />
  );
}
