"use client";

import { useMemo, useState } from "react";
import { useFields } from "@/components/hooks/use-fields";
import { useMemberActions, useMemberPages } from "@/components/hooks/use-people";
import { AddPerson } from "@/components/people/add-person";
import { FieldGrants } from "@/components/people/field-grants";
import { RoleSelect } from "@/components/people/role-select";
import { Button } from "@/components/ui/button";
import { DataTable, type DataColumn } from "@/components/ui/data-table";
import { ConfirmDialog, Dialog } from "@/components/ui/dialog";
import { formatDay } from "@/components/ui/format-date";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import { describeFailure } from "@/lib/api/api-problem";
import type { Member } from "@/lib/schemas/people";

export interface PeoplePageProps {
  userId: string;
  mayWrite: boolean;
}

/** Who belongs to the organisation, as what, and which fields were given to them. */
export function PeoplePage({ userId, mayWrite }: PeoplePageProps) {
  const members = useMemberPages();
  const fields = useFields();
  const actions = useMemberActions();
  const [grantsOf, setGrantsOf] = useState<Member | null>(null);
  const { mutate: change } = actions.change;
  const columns = useMemo<DataColumn<Member>[]>(() => {
    const nameOf = new Map(fields.data?.items.map((field) => [field.id, field.name]));
    const given = (member: Member) => member.fieldIds.map((id) => nameOf.get(id) ?? "a deleted field").join(", ");
    return [
      {
        id: "name",
        header: "Name",
        value: (member) => member.name,
        cell: (member) => <span className="font-semibold">{member.name}</span>,
      },
      { id: "email", header: "Email", value: (member) => member.email },
      {
        id: "role",
        header: "Role",
        value: (member) => member.role,
        cell: (member) =>
          mayWrite && member.userId !== userId ? (
            <RoleSelect
              role={member.role}
              label={`Role of ${member.name}`}
              onChange={(role) => change({ memberId: member.id, patch: { role } })}
            />
          ) : (
            member.role
          ),
      },
      { id: "fields", header: "Fields given", value: given, cell: (member) => given(member) || "–" },
      {
        id: "since",
        header: "Since",
        value: (member) => member.createdAt,
        cell: (member) => formatDay(member.createdAt),
      },
    ];
  }, [change, fields.data, mayWrite, userId]);
  if (members.isPending) return <Loading what="the people" />;
  if (!members.items)
    return (
      <Notice state="act" urgent>
        {describeFailure(members.error)}
      </Notice>
    );
  const failure = actions.change.error ?? actions.remove.error;
  return (
    <div className="space-y-6">
      {mayWrite ? <AddPerson actions={actions} /> : null}
      {failure ? (
        <Notice state="act" urgent>
          {describeFailure(failure)}
        </Notice>
      ) : null}
      <DataTable
        caption="People of this organisation"
        rows={members.items}
        more={members.more}
        columns={columns}
        rowId={(member) => member.id}
        fileName="people"
        initialSort={{ id: "name", desc: false }}
        actions={
          mayWrite
            ? (member) => (
                <>
                  {member.role === "viewer" || member.role === "operator" ? (
                    <Button kind="quiet" onClick={() => setGrantsOf(member)}>
                      Give fields
                    </Button>
                  ) : null}
                  {member.userId === userId ? null : (
                    <ConfirmDialog
                      trigger={<Button kind="quiet">Remove</Button>}
                      title={`Remove ${member.name}?`}
                      confirmWords="Remove"
                      onConfirm={() => actions.remove.mutate(member.id)}
                    >
                      <p>They can no longer sign in to this organisation, and their tokens stop working at once.</p>
                      <p>What they took in and recorded stays.</p>
                    </ConfirmDialog>
                  )}
                </>
              )
            : undefined
        }
      />
      <Dialog
        open={grantsOf !== null}
        onOpenChange={(open) => {
          if (!open) setGrantsOf(null);
        }}
        title={`Fields given to ${grantsOf?.name ?? ""}`}
        description={
          grantsOf?.role === "operator"
            ? "An operator sees seeding logs everywhere, and harvest logs only of these fields."
            : "A viewer sees these fields and no others."
        }
      >
        {grantsOf ? (
          <FieldGrants
            member={grantsOf}
            fields={fields.data?.items ?? []}
            onSave={(fieldIds) => {
              change({ memberId: grantsOf.id, patch: { fieldIds } });
              setGrantsOf(null);
            }}
          />
        ) : null}
      </Dialog>
    </div>
  );
}
