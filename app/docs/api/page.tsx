import type { Metadata } from "next";
import { container } from "@/app/_server/container";
import { OperationCard } from "@/components/reference/operation-card";
import { CodeText } from "@/components/reference/code-text";
import { readDocument } from "@/components/reference/read-document";
import { Wordmark } from "@/components/ui/wordmark";
import { buildOpenApiDocument } from "@/lib/openapi/build-document";

export const metadata: Metadata = { title: "API reference" };

export default function ApiReference() {
  const { baseUrl } = container().env;
  const { description, sections } = readDocument(buildOpenApiDocument(baseUrl));
  return (
    <main className="mx-auto max-w-4xl px-5 py-8">
      <Wordmark href="/" />
      <h1 className="mt-6 text-page">API reference</h1>
      <p className="mt-3 max-w-2xl text-ink-soft">
        <CodeText>{description}</CodeText>
      </p>
      <p className="mt-3">
        The same as a file: <a href="/api/v1/openapi.json">OpenAPI 3.1</a>. Make a personal token under Settings and
        send it like this:
      </p>
      <pre tabIndex={0} className="sheet mt-3 overflow-x-auto p-3 text-table">
        {`curl -H "Authorization: Bearer $TOKEN" ${baseUrl}/api/v1/fields`}
      </pre>
      <nav aria-label="Sections" className="mt-6 flex flex-wrap gap-x-4">
        {sections.map(({ tag }) => (
          <a key={tag} href={`#${encodeURIComponent(tag)}`} className="inline-flex min-h-11 items-center md:min-h-8">
            {tag}
          </a>
        ))}
      </nav>
      {sections.map(({ tag, operations }) => (
        <section key={tag} id={encodeURIComponent(tag)} className="mt-8 scroll-mt-4">
          <h2 className="border-b border-ink pb-1 text-section">{tag}</h2>
          {operations.map((operation) => (
            <OperationCard key={operation.operationId} operation={operation} />
          ))}
        </section>
      ))}
    </main>
  );
}
