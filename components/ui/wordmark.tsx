import Link from "next/link";
import { classNames } from "@/components/ui/class-names";

/** A disc in the ground line, and the name. `short` keeps only the disc on a phone. */
export function Wordmark({ href, short = false }: { href: string; short?: boolean }) {
  return (
    <Link
      href={href}
      aria-label="Coulterbook"
      className="inline-flex min-h-11 items-center gap-2 text-ink no-underline"
    >
      <svg viewBox="0 0 24 24" width="24" height="24" aria-hidden="true" fill="none" strokeWidth="1.6">
        <circle cx="12" cy="10.5" r="7" stroke="#1E2430" />
        <circle cx="12" cy="10.5" r="1.2" fill="#1E2430" />
        <path d="M1 14.5h4.9M18.1 14.5H23" stroke="#7D5A14" />
        <path d="M12 17.5v5" stroke="#9A4A2C" />
      </svg>
      <span className={classNames("text-section font-semibold", short && "max-md:hidden")}>Coulterbook</span>
    </Link>
  );
}
