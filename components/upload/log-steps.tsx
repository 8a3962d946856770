import { StateMark } from "@/components/ui/state-mark";
import { classNames } from "@/components/ui/class-names";
import type { LogStatus } from "@/lib/schemas/logs";

const STEPS = ["File kept", "Columns understood", "Rows on the ground", "Verdict"] as const;

/** How many steps are behind, by status; a failed log says nothing more than that its file is kept. */
const DONE: Record<LogStatus, number> = {
  queued: 1,
  reading: 1,
  "needs-mapping": 1,
  building: 2,
  ready: 4,
  failed: 1,
};

/** The four steps from file to verdict, done ones ticked. */
export function LogSteps({ status }: { status: LogStatus }) {
  const done = DONE[status];
  return (
    <ol className="grid grid-cols-2 gap-x-6 gap-y-2 sm:flex sm:flex-wrap">
      {STEPS.map((step, index) => (
        <li
          key={step}
          aria-current={index === done ? "step" : undefined}
          className={classNames(
            "flex items-center gap-2",
            index < done ? "text-ink" : "text-ink-soft",
            index === done && "font-semibold",
          )}
        >
          <StateMark state={index < done ? "fine" : index === done ? "look" : "none"} />
          {step}
          <span className="sr-only">{index < done ? " (done)" : index === done ? " (now)" : " (to come)"}</span>
        </li>
      ))}
    </ol>
  );
}
