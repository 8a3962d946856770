"use client";

import Link from "next/link";
import { useParams } from "next/navigation";
import { buttonClass } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { PageBody } from "@/components/ui/page-body";

/** In place of a page that is there but not for this role: whom to ask and the way back, instead of a page that seems lost. */
export function RoleBars() {
  const { org } = useParams<{ org: string }>();
  return (
    <PageBody>
      <Notice state="look" title="Your role does not open this page">
        An owner of the organisation can give you another role, under People.
      </Notice>
      <p className="mt-5">
        <Link href={`/${org}/fields`} className={buttonClass("plain")}>
          Back to the fields
        </Link>
      </p>
    </PageBody>
  );
}
