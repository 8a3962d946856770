"use client";

import { useMemo } from "react";
import type { MorePages } from "@/components/hooks/use-pages";
import { AUDIENCES, describeShareState, LAYER_WORDS } from "@/components/sharing/share-words";
import { Button } from "@/components/ui/button";
import { DataTable, type DataColumn } from "@/components/ui/data-table";
import { ConfirmDialog } from "@/components/ui/dialog";
import { formatDay, formatMoment } from "@/components/ui/format-date";
import { StateWord } from "@/components/ui/state-mark";
import { SHARE_LAYERS, type Share } from "@/lib/schemas/shares";

function audienceWord(share: Share): string {
  return AUDIENCES.find(({ id }) => id === share.audience)?.word ?? share.audience;
}

function layerWords(share: Share): string {
  return SHARE_LAYERS.filter((layer) => share.layers.includes(layer))
    .map((layer) => LAYER_WORDS[layer].word.toLowerCase())
    .join(", ");
}

export interface ShareTableProps {
  shares: Share[];
  onRevoke: (shareId: string) => void;
  more?: MorePages;
}

/** The links made for a field: who can look, for how long, whether they did. */
export function ShareTable({ shares, onRevoke, more }: ShareTableProps) {
  const columns = useMemo<DataColumn<Share>[]>(
    () => [
      {
        id: "for",
        header: "For",
        value: audienceWord,
        cell: (share) => (
          <span className="font-semibold">
            {audienceWord(share)}
            {share.hasPasscode ? <span className="font-normal text-ink-soft"> · passcode</span> : null}
          </span>
        ),
      },
      {
        id: "state",
        header: "State",
        value: (share) => describeShareState(share.state).word,
        cell: (share) => {
          const { mark, word } = describeShareState(share.state);
          return <StateWord state={mark}>{word}</StateWord>;
        },
      },
      { id: "shows", header: "Shows", value: layerWords },
      { id: "made", header: "Made", value: (share) => share.createdAt, cell: (share) => formatDay(share.createdAt) },
      { id: "ends", header: "Until", value: (share) => share.expiresAt, cell: (share) => formatDay(share.expiresAt) },
      { id: "opened", header: "Times opened", numeric: true, value: (share) => share.openedCount },
      {
        id: "last",
        header: "Last opened",
        value: (share) => share.lastOpenedAt ?? undefined,
        cell: (share) => formatMoment(share.lastOpenedAt) || "never",
      },
    ],
    [],
  );
  return (
    <DataTable
      caption="Links made for this field"
      rows={shares}
      columns={columns}
      rowId={(share) => share.id}
      fileName="shares"
      initialSort={{ id: "made", desc: true }}
      more={more}
      actions={(share) =>
        share.state === "open" ? (
          <ConfirmDialog
            trigger={<Button kind="quiet">Withdraw</Button>}
            title="Withdraw this link?"
            confirmWords="Withdraw"
            onConfirm={() => onRevoke(share.id)}
          >
            <p>
              Whoever opens it from now on sees that it was withdrawn, and nothing of the field. You can make a new one.
            </p>
          </ConfirmDialog>
        ) : null
      }
    />
  );
}
