"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { signIn } from "next-auth/react";
import { useState } from "react";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { Button } from "@/components/ui/button";
import { TextField } from "@/components/ui/form-field";
import { Notice } from "@/components/ui/notice";
import type { DemoAccount } from "@/lib/access/demo-accounts";

const FormShape = z.object({
  email: z.email("Enter an email address, such as name@farm.example."),
  password: z.string().min(1, "Enter your password."),
});
type FormValues = z.infer<typeof FormShape>;

/** Words for the ways a sign-in can fail. The same words for a wrong password and an unknown address, on purpose. */
export function signInWords(error: string | null, status: number | null = null): string | null {
  if (status === 429 || error === "too_many_requests") {
    return "Too many tries. Wait 15 minutes, then try again; or ask an owner of your organisation for a new password.";
  }
  if (status !== null && status >= 500) return "The server could not check this. Try again in a moment.";
  if (error === "CredentialsSignin") return "That email and password do not belong together. Check both and try again.";
  return error ? "Signing in did not work. Try again." : null;
}

/** After a sign-in: the whole page anew, so that nothing of the last person stays in memory. */
function enter(): void {
  window.location.replace(new URL("/", window.location.href));
}

export interface SignInFormProps {
  /** Demo mode only. */
  demo: { password: string; accounts: DemoAccount[] } | null;
  startError: string | null;
}

export function SignInForm({ demo, startError }: SignInFormProps) {
  const [failure, setFailure] = useState<string | null>(signInWords(startError));
  const [busy, setBusy] = useState(false);
  const form = useForm<FormValues>({ resolver: zodResolver(FormShape), defaultValues: { email: "", password: "" } });
  const { errors } = form.formState;

  const attempt = async ({ email, password }: FormValues) => {
    setBusy(true);
    setFailure(null);
    const outcome = await signIn("credentials", { email, password, redirect: false, callbackUrl: "/" }).catch(
      () => null,
    );
    if (outcome?.ok && !outcome.error) return enter();
    setBusy(false);
    setFailure(
      outcome
        ? signInWords(outcome.error ?? "unknown", outcome.status)
        : "The server did not answer. Check the connection.",
    );
  };

  return (
    <div className="space-y-8">
      <form noValidate className="space-y-5" onSubmit={(event) => void form.handleSubmit(attempt)(event)}>
        {failure ? (
          <Notice state="act" urgent>
            {failure}
          </Notice>
        ) : null}
        <TextField
          label="Email"
          type="email"
          autoComplete="username"
          error={errors.email?.message}
          {...form.register("email")}
        />
        <TextField
          label="Password"
          type="password"
          autoComplete="current-password"
          error={errors.password?.message}
          {...form.register("password")}
        />
        <Button type="submit" kind="primary" disabled={busy} className="w-full md:min-h-11">
          {busy ? "Signing in…" : "Sign in"}
        </Button>
      </form>
      {demo ? (
        <section className="space-y-2 border-t border-rule pt-5">
          <h2 className="font-semibold">Or come in as one of the demo people</h2>
          <ul className="divide-y divide-rule border-y border-rule">
            {demo.accounts.map((account) => (
              <li key={account.email}>
                <button
                  type="button"
                  disabled={busy}
                  onClick={() => void attempt({ email: account.email, password: demo.password })}
                  className="block min-h-14 w-full py-2 text-left hover:bg-sheet disabled:opacity-50"
                >
                  <span className="block text-slate underline underline-offset-3">{account.email}</span>
                  <span className="block text-table text-ink-soft">{account.does}</span>
                </button>
              </li>
            ))}
          </ul>
          <p className="text-table text-ink-soft">
            Demo mode. The password of all of them is <code className="select-all">{demo.password}</code>
          </p>
        </section>
      ) : null}
    </div>
  );
}
