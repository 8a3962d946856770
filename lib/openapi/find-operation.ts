import { OPERATIONS } from "@/lib/openapi";
import type { Method, Operation } from "@/lib/openapi/operation";

function segments(path: string): string[] {
  return path.split("/").filter(Boolean);
}

/** Whether an address fits a template; `{y}.png` takes any name that ends in `.png`. */
function fits(template: string, pathname: string): boolean {
  const wanted = segments(template);
  const given = segments(pathname);
  return (
    wanted.length === given.length &&
    wanted.every((part, i) => {
      const parameter = /^\{\w+\}(.*)$/.exec(part);
      return parameter ? given[i]!.endsWith(parameter[1] ?? "") : part === given[i];
    })
  );
}

/** Operations at an address; those spelled out win over those with parameters. */
export function findOperations(pathname: string): Operation[] {
  const exact = OPERATIONS.filter((operation) => operation.path === pathname);
  return exact.length > 0 ? exact : OPERATIONS.filter((operation) => fits(operation.path, pathname));
}

/** Methods an address takes, for the `Allow` header. */
export function findMethods(pathname: string): Method[] {
  return [...new Set(findOperations(pathname).map((operation) => operation.method))];
}
