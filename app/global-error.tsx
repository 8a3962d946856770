"use client";

import "@/app/globals.css";

/** Stands in for the whole page when even its frame failed; so it brings its own. */
export default function GlobalError({ reset }: { error: Error; reset: () => void }) {
  return (
    <html lang="en">
      <body className="bg-paper p-6 text-ink">
        <h1 className="text-page font-semibold">Coulterbook could not be shown</h1>
        <p className="mt-3">Something went wrong on our side. Nothing you saved is lost.</p>
        <button type="button" onClick={reset} className="mt-6 min-h-11 rounded border border-ink px-4 font-semibold">
          Try again
        </button>
      </body>
    </html>
  );
}
