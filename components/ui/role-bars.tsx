import { Notice } from "@/components/ui/notice";
import { PageBody } from "@/components/ui/page-body";
import type { Role } from "@/lib/access/permissions";

export interface RoleBarsProps {
  role: Role;
  /** What the page is for: "describe machines". */
  toDo: string;
}

/** In place of a page that is there but not for this role: whom to ask, instead of a page that seems lost. */
export function RoleBars({ role, toDo }: RoleBarsProps) {
  return (
    <PageBody>
      <Notice state="look" title={`Your role may not ${toDo}`}>
        You are here as {role}. An owner of the organisation can give you another role, under People.
      </Notice>
    </PageBody>
  );
}
