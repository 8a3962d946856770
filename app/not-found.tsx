import Link from "next/link";
import { buttonClass } from "@/components/ui/button";
import { Wordmark } from "@/components/ui/wordmark";

export default function NotFound() {
  return (
    <main className="mx-auto max-w-xl px-5 py-10 md:py-20">
      <Wordmark href="/" />
      <h1 className="mt-8 text-page">This page is not here</h1>
      <p className="mt-3 text-ink-soft">
        The address may be mistyped, the thing may have been deleted, or it belongs to an organisation you are not part
        of.
      </p>
      <p className="mt-6">
        <Link href="/" className={buttonClass("plain")}>
          To your fields
        </Link>
      </p>
    </main>
  );
}
