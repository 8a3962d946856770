"use client";

import { useEffect } from "react";
import { Button } from "@/components/ui/button";

interface ErrorPageProps {
  error: Error & { digest?: string };
  reset: () => void;
}

export default function ErrorPage({ error, reset }: ErrorPageProps) {
  useEffect(() => {
    console.error(error);
  }, [error]);
  return (
    <div className="mx-auto max-w-xl px-5 py-10 md:py-20" role="alert">
      <h1 className="text-page">This page could not be shown</h1>
      <p className="mt-3 text-ink-soft">
        Something went wrong on our side. Nothing you saved is lost. Try again; if it comes back, tell the owner of your
        organisation{error.digest ? ` and give the mark ${error.digest}` : ""}.
      </p>
      <p className="mt-6">
        <Button kind="primary" onClick={reset}>
          Try again
        </Button>
      </p>
    </div>
  );
}
