import { DEMO_ACCOUNTS, DEMO_PASSWORD } from "@/lib/access/demo-accounts";

/** The demo people and their password. Rendered in demo mode only. */
export function DemoAccounts() {
  return (
    <div className="space-y-3">
      <h2 className="text-section">This is the demo</h2>
      <p className="text-ink-soft">
        All names and data are invented: the farm Larkspur Flats, and a neighbour who must see none of it. The password
        of every account is{" "}
        <code className="select-all rounded border border-rule bg-sheet px-1.5 py-0.5 text-ink">{DEMO_PASSWORD}</code>
      </p>
      <dl className="divide-y divide-rule border-y border-rule">
        {DEMO_ACCOUNTS.map((account) => (
          <div key={account.email} className="gap-4 py-2 md:flex">
            <dt className="shrink-0 basis-64">{account.email}</dt>
            <dd className="text-ink-soft">{account.does}</dd>
          </div>
        ))}
      </dl>
    </div>
  );
}
