"use client";

import { Ellipsis } from "lucide-react";
import { useState } from "react";
import type { useLogActions } from "@/components/hooks/use-logs";
import { buttonClass } from "@/components/ui/button";
import { ConfirmDialog } from "@/components/ui/dialog";
import { Menu, MenuItem, MenuLink, MenuRule } from "@/components/ui/menu";
import { isWorking } from "@/components/upload/log-state";
import { can, type Role } from "@/lib/access/permissions";
import { logOriginalPath } from "@/lib/api/client";
import type { Log } from "@/lib/schemas/logs";

export interface LogMenuProps {
  log: Log;
  fieldPath: string;
  role: Role;
  actions: ReturnType<typeof useLogActions>;
}

/** The rest of what can be done to a log, as far as the person's role goes. */
export function LogMenu({ log, fieldPath, role, actions }: LogMenuProps) {
  const [asking, setAsking] = useState(false);
  const path = `${fieldPath}/logs/${log.id}`;
  return (
    <>
      <Menu
        trigger={
          <button type="button" className={buttonClass("quiet", "max-md:px-3")} aria-label={`More for ${log.name}`}>
            <Ellipsis size={18} strokeWidth={1.5} aria-hidden />
          </button>
        }
      >
        <MenuLink href={path}>How it was read</MenuLink>
        {can(role, "logs.map") ? <MenuLink href={`${path}/columns`}>What the columns mean</MenuLink> : null}
        {log.status === "ready" ? <MenuLink href={`${path}/cleaning`}>Cleaning rules</MenuLink> : null}
        {log.status === "ready" ? (
          <MenuLink href={`${fieldPath}/compare?b=${log.id}`}>Compare with another log</MenuLink>
        ) : null}
        <MenuLink href={logOriginalPath(log.id)} download>
          Download the original file
        </MenuLink>
        {can(role, "logs.upload") && isWorking(log.status) ? (
          <MenuItem onSelect={() => actions.cancel.mutate(log.id)}>Stop reading</MenuItem>
        ) : null}
        {can(role, "logs.upload") && log.status === "failed" ? (
          <MenuItem onSelect={() => actions.retry.mutate(log.id)}>Read it again</MenuItem>
        ) : null}
        {log.removable ? (
          <>
            <MenuRule />
            <MenuItem onSelect={() => setAsking(true)}>Remove…</MenuItem>
          </>
        ) : null}
      </Menu>
      <ConfirmDialog
        open={asking}
        onOpenChange={setAsking}
        title={`Remove ${log.name}?`}
        confirmWords="Remove the log"
        onConfirm={() => actions.remove(log)}
      >
        <p>
          The original file and everything worked out from it go. You can undo it for half a minute, then not any more.
        </p>
        <p>Download the original first if you have no other copy.</p>
      </ConfirmDialog>
    </>
  );
}
