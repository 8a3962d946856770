import type { ReactNode } from "react";

type ClosedState = "passcode" | "unknown" | "expired" | "revoked" | "busy";

const WORDS: Record<ClosedState, { title: string; text: string }> = {
  passcode: {
    title: "This page asks for a passcode",
    text: "Whoever sent you the link told you the passcode, or can.",
  },
  unknown: {
    title: "This link opens nothing",
    text: "It may be cut off or mistyped. Open it again from the message it came in, or ask for it once more.",
  },
  expired: {
    title: "This link has run out",
    text: "It was made for a limited time, and that is over. Whoever sent it to you can make a new one.",
  },
  revoked: {
    title: "This link was withdrawn",
    text: "Whoever sent it to you has taken it back. If you still need it, ask them for a new one.",
  },
  busy: { title: "One moment", text: "Too many links were tried from here. Wait a few minutes, then open it again." },
};

/** A share that shows nothing, and why, in kind words; nothing of the field is told. */
export function ClosedShare({ state, children }: { state: ClosedState; children?: ReactNode }) {
  return (
    <main className="mx-auto max-w-md space-y-5 px-5 py-16">
      <h1 className="text-page">{WORDS[state].title}</h1>
      <p className="text-ink-soft">{WORDS[state].text}</p>
      {children}
    </main>
  );
}
