"use client";

import { useMutation } from "@tanstack/react-query";
import { useState } from "react";
import { Button } from "@/components/ui/button";
import { TextField } from "@/components/ui/form-field";
import { ApiProblem, describeFailure } from "@/lib/api/api-problem";
import { openWithPasscode } from "@/lib/api/open-with-passcode";

function failureWords(error: unknown): string | undefined {
  if (!error) return undefined;
  if (error instanceof ApiProblem && error.status === 401)
    return "That passcode is not right. Check it with whoever sent you the link.";
  if (error instanceof ApiProblem && error.status === 429) return "Too many tries. Wait a while, then try again.";
  return describeFailure(error);
}

/** Asked before a share with a passcode shows anything. */
export function PasscodeForm({ token }: { token: string }) {
  const [passcode, setPasscode] = useState("");
  const open = useMutation({
    mutationFn: () => openWithPasscode(token, passcode),
    // The whole page anew: it was refused as a whole, and a refresh stays inside the refusal.
    onSuccess: () => window.location.reload(),
  });
  return (
    <form
      className="max-w-xs space-y-4"
      onSubmit={(event) => {
        event.preventDefault();
        open.mutate();
      }}
    >
      <TextField
        label="Passcode"
        type="password"
        autoComplete="off"
        value={passcode}
        error={failureWords(open.error)}
        onChange={(event) => setPasscode(event.target.value)}
      />
      <Button type="submit" kind="primary" disabled={passcode === "" || open.isPending} className="w-full">
        Open
      </Button>
    </form>
  );
}
