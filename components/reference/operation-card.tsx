import { CodeText } from "@/components/reference/code-text";
import { schemaLines, typeWords, type SchemaLine } from "@/components/reference/describe-schema";
import type { ReferenceOperation } from "@/components/reference/read-document";

function LineTable({ caption, lines }: { caption: string; lines: SchemaLine[] }) {
  if (lines.length === 0) return null;
  return (
    <table className="w-full text-left text-table">
      <caption className="pb-1 text-left font-semibold">{caption}</caption>
      <tbody>
        {lines.map((line) => (
          <tr key={line.path} className="border-t border-rule align-top">
            <th scope="row" className="w-2/5 py-1 pr-3 font-normal [overflow-wrap:anywhere]">
              {line.path}
              {line.required ? null : <span className="text-ink-faint"> optional</span>}
            </th>
            <td className="py-1 text-ink-soft [overflow-wrap:anywhere]">
              {line.type}
              {line.description ? `. ${line.description}` : null}
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function requestLines(operation: ReferenceOperation): [caption: string, lines: SchemaLine[]][] {
  const parameters = operation.parameters
    .filter((parameter) => parameter.in !== "path")
    .map((parameter) => ({
      path: parameter.name,
      type: typeWords(parameter.schema ?? {}),
      required: parameter.required ?? false,
      description: [parameter.in === "header" ? "header" : "", parameter.description ?? ""].filter(Boolean).join(": "),
    }));
  const bodies = Object.entries(operation.requestBody?.content ?? {}).map(
    ([kind, { schema }]): [string, SchemaLine[]] => [`Send as ${kind}`, schema ? schemaLines(schema) : []],
  );
  return [["In the address", parameters], ...bodies];
}

/** One operation: what it takes, what it answers, what may go wrong. */
export function OperationCard({ operation }: { operation: ReferenceOperation }) {
  const answers = Object.entries(operation.responses);
  const good = answers.filter(([status]) => Number(status) < 400);
  const bad = answers.filter(([status]) => Number(status) >= 400);
  return (
    <details id={operation.operationId} className="group border-b border-rule">
      <summary className="flex min-h-11 flex-wrap items-baseline gap-x-4 gap-y-1 py-2">
        <code className="font-semibold [overflow-wrap:anywhere]">
          {operation.method} {operation.path}
        </code>
        <span className="text-ink-soft">{operation.summary}</span>
      </summary>
      <div className="space-y-4 pb-6 md:pl-4">
        {operation.description ? (
          <p className="max-w-2xl">
            <CodeText>{operation.description}</CodeText>
          </p>
        ) : null}
        <p className="text-table text-ink-soft">
          {operation["x-permission"] === "public"
            ? "No account needed."
            : `Permission: ${operation["x-permission"] ?? "signed in"}.`}
        </p>
        {requestLines(operation).map(([caption, lines]) => (
          <LineTable key={caption} caption={caption} lines={lines} />
        ))}
        {good.map(([status, answer]) => (
          <div key={status}>
            <p className="text-table">
              <span className="font-semibold">Answers {status}</span>{" "}
              <span className="text-ink-soft">{answer.description}</span>
            </p>
            {Object.entries(answer.content ?? {}).map(([kind, { schema }]) => (
              <LineTable key={kind} caption={kind} lines={schema ? schemaLines(schema) : []} />
            ))}
          </div>
        ))}
        {bad.length > 0 ? (
          <p className="text-table text-ink-soft">
            May refuse with{" "}
            {bad.map(([status, answer]) => `${status} (${answer.description.toLowerCase()})`).join(", ")}.
          </p>
        ) : null}
      </div>
    </details>
  );
}
