import type { Problem } from "@/lib/schemas/problem";

/** A reply that says no: RFC 9457 problem details as an error. `message` is what the person may read. */
export class ApiProblem extends Error {
  readonly status: number;
  readonly code: string;
  readonly problem: Problem;

  constructor(problem: Problem) {
    super(problem.detail || problem.title);
    this.name = "ApiProblem";
    this.status = problem.status;
    this.code = problem.code;
    this.problem = problem;
  }

  /** What is wrong with one part of the input, if the reply names it. */
  messageFor(path: string): string | undefined {
    return this.problem.errors?.find((place) => place.path === path || place.column === path)?.message;
  }
}

/** Words for any failure that reached a screen. */
export function describeFailure(error: unknown): string {
  if (error instanceof ApiProblem) return error.message;
  if (error instanceof TypeError) return "The server did not answer. Check the connection, then try again.";
  return "Something went wrong here. Reload the page; if it comes back, tell the owner of your organisation.";
}
