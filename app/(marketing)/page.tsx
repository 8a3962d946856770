import Link from "next/link";
import { redirect } from "next/navigation";
import { container } from "@/app/_server/container";
import { currentScope } from "@/app/_server/require-scope";
import { DemoAccounts } from "@/components/settings/demo-accounts";
import { buttonClass } from "@/components/ui/button";
import { Wordmark } from "@/components/ui/wordmark";

export default async function FrontPage() {
  const signedIn = await currentScope();
  if (signedIn) redirect(`/${signedIn.organisation.slug}/fields`);
  return (
    <main className="mx-auto max-w-2xl px-5 py-10 md:py-20">
      <Wordmark href="/" />
      <h1 className="mt-8 text-number font-semibold">Did every row stay in the ground?</h1>
      <p className="mt-5 text-section text-ink-soft">
        Coulterbook reads the row-by-row log of a drill or planter, puts every row on the ground where it ran, and says
        in plain words which rows lost contact or worked too hard, where, and what to check before the next field. Each
        field keeps a book of its own that the operator, the agronomist, the researcher and the landowner can read.
      </p>
      <p className="mt-8">
        <Link href="/sign-in" className={buttonClass("primary", "md:min-h-11 md:px-6")}>
          Sign in
        </Link>
      </p>
      {container().env.isDemo ? (
        <section className="mt-14 border-t border-rule pt-6">
          <DemoAccounts />
        </section>
      ) : null}
      <p className="mt-14 border-t border-rule pt-6 text-table text-ink-soft">
        Coulterbook reads logs and never sends a setting to a machine. <Link href="/docs/api">API reference</Link>
      </p>
    </main>
  );
}
