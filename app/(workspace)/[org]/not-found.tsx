import { PageGone } from "@/components/ui/page-gone";

/** A field, log or machine that is not here, inside the frame of the organisation. */
export default function NotFound() {
  return <PageGone />;
}
