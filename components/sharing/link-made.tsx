"use client";

import { useQuery } from "@tanstack/react-query";
import { toString } from "qrcode";
import { Button } from "@/components/ui/button";
import { CopyText } from "@/components/ui/copy-text";
import { formatDay } from "@/components/ui/format-date";
import { Notice } from "@/components/ui/notice";
import type { ShareCreated } from "@/lib/schemas/shares";

export interface LinkMadeProps {
  share: ShareCreated;
  onDone: () => void;
}

/** The address of a new share, as text and as a picture to point a phone at. It cannot be shown again. */
export function LinkMade({ share, onDone }: LinkMadeProps) {
  const picture = useQuery({
    queryKey: ["share-picture", share.url],
    queryFn: () => toString(share.url, { type: "svg", margin: 1, color: { dark: "#1E2430", light: "#FFFFFF" } }),
    staleTime: Infinity,
  });
  return (
    <section className="sheet max-w-2xl space-y-4 p-4" aria-label="The new link">
      <h2 className="text-section">The link is ready</h2>
      <p className="text-ink-soft">
        Copy it now: it is shown this once, because only its fingerprint is kept. It works until{" "}
        {formatDay(share.expiresAt)}.
      </p>
      <CopyText text={share.url} label="Address of the share" />
      {share.emailed === true ? <Notice state="fine">It was also sent by email.</Notice> : null}
      {share.emailed === false ? (
        <Notice state="act">The email could not be sent. Copy the link and send it yourself.</Notice>
      ) : null}
      {picture.data ? (
        <div
          role="img"
          aria-label="The same link, to point a phone's camera at"
          className="h-40 w-40 [&>svg]:h-full [&>svg]:w-full"
          // Drawn by our own library from our own address: no outside text reaches it unescaped.
          dangerouslySetInnerHTML={{ __html: picture.data }}
        />
      ) : null}
      <div className="flex flex-wrap gap-2">
        <a href={share.url} target="_blank" rel="noreferrer" className="inline-flex min-h-11 items-center md:min-h-9">
          See what they will see
        </a>
        <Button kind="quiet" onClick={onDone}>
          I have it
        </Button>
      </div>
    </section>
  );
}
