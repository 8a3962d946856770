"use client";

import Link from "next/link";
import { useParams } from "next/navigation";
import { buttonClass } from "@/components/ui/button";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";

/** In place of a page whose field, log or machine is not here. */
export function PageGone() {
  const { org } = useParams<{ org: string }>();
  return (
    <PageBody>
      <PageHeading
        title="This page is not here"
        lead="The address may be mistyped, the thing may have been deleted, or it was not given to you."
      />
      <p>
        <Link href={`/${org}/fields`} className={buttonClass("plain")}>
          To the fields
        </Link>
      </p>
    </PageBody>
  );
}
