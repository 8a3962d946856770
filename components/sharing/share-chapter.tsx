"use client";

import { useState } from "react";
import { useField } from "@/components/hooks/use-fields";
import { useLogs } from "@/components/hooks/use-logs";
import { useShareActions, useSharePages } from "@/components/hooks/use-shares";
import { LinkMade } from "@/components/sharing/link-made";
import { NewShare } from "@/components/sharing/new-share";
import { ShareTable } from "@/components/sharing/share-table";
import { Button } from "@/components/ui/button";
import { EmptyState } from "@/components/ui/empty-state";
import { Loading } from "@/components/ui/loading";
import { Notice } from "@/components/ui/notice";
import { describeFailure } from "@/lib/api/api-problem";

/** Links out of this field: made, listed, taken back. */
export function ShareChapter({ fieldId }: { fieldId: string }) {
  const field = useField(fieldId);
  const logs = useLogs(fieldId);
  const shares = useSharePages(fieldId);
  const actions = useShareActions(fieldId);
  const [making, setMaking] = useState(false);
  const made = actions.create.data;
  if (shares.isPending || logs.isPending || field.isPending) return <Loading what="the links" />;
  const failed = shares.error ?? logs.error ?? field.error;
  if (failed || !logs.data || !shares.items || !field.data) {
    return (
      <Notice state="act" urgent>
        {describeFailure(failed)}
      </Notice>
    );
  }
  return (
    <div className="space-y-6">
      {made ? <LinkMade share={made} onDone={() => actions.create.reset()} /> : null}
      {!made && making ? (
        <NewShare
          logs={logs.data.items}
          landowner={field.data.landowner}
          pending={actions.create.isPending}
          failure={actions.create.error}
          onCreate={(input) => actions.create.mutate(input, { onSuccess: () => setMaking(false) })}
        />
      ) : null}
      {made || making ? null : (
        <Button kind="primary" onClick={() => setMaking(true)}>
          Make a link
        </Button>
      )}
      {actions.revoke.error ? (
        <Notice state="act" urgent>
          {describeFailure(actions.revoke.error)}
        </Notice>
      ) : null}
      {shares.items.length > 0 ? (
        <ShareTable shares={shares.items} more={shares.more} onRevoke={(shareId) => actions.revoke.mutate(shareId)} />
      ) : made || making ? null : (
        <EmptyState title="Nobody has a link yet">
          <p>
            A link opens one page about one log of this field, without an account: for the landowner, an adviser,
            whoever drives. You choose what it shows and for how long, and can withdraw it at any time.
          </p>
        </EmptyState>
      )}
    </div>
  );
}
