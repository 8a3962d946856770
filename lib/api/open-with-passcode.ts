import { requestNothing } from "@/lib/api/request-json";

/** Sends the passcode of a share; the right one is remembered by a cookie. @throws ApiProblem 401 wrong, 429 too many tries */
export function openWithPasscode(token: string, passcode: string): Promise<void> {
  return requestNothing(`/api/v1/shared/${encodeURIComponent(token)}/passcode`, { method: "POST", body: { passcode } });
}
