import type { Metadata } from "next";
import { redirect } from "next/navigation";
import { container } from "@/app/_server/container";
import { currentScope } from "@/app/_server/require-scope";
import { SignInForm } from "@/components/settings/sign-in-form";
import { Wordmark } from "@/components/ui/wordmark";
import { DEMO_ACCOUNTS, DEMO_PASSWORD } from "@/lib/access/demo-accounts";

export const metadata: Metadata = { title: "Sign in" };

interface SignInPageProps {
  searchParams: Promise<{ error?: string; callbackUrl?: string }>;
}

export default async function SignInPage({ searchParams }: SignInPageProps) {
  const [{ error }, signedIn] = await Promise.all([searchParams, currentScope()]);
  if (signedIn) redirect(`/${signedIn.organisation.slug}/fields`);
  const demo = container().env.isDemo ? { password: DEMO_PASSWORD, accounts: [...DEMO_ACCOUNTS] } : null;
  return (
    <main className="mx-auto max-w-md px-5 py-10 md:py-20">
      <Wordmark href="/" />
      <h1 className="mb-6 mt-8 text-page">Sign in</h1>
      <SignInForm demo={demo} startError={error ?? null} />
    </main>
  );
}
