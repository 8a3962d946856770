import { RoleBars } from "@/components/ui/role-bars";

/** In place of a page that is there but not for this role: 403. */
export default function Forbidden() {
  return <RoleBars />;
}
