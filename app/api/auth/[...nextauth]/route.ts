import NextAuth from "next-auth";
import { NextRequest } from "next/server";
import { authOptions } from "@/app/_server/auth";
import { limitSignIn } from "@/app/_server/limit-sign-in";
import { forgetReturnCookie, hasUnreadableReturnCookie, mendSignInRequest } from "@/app/_server/mend-sign-in";
import { toResponse } from "@/app/_server/to-response";

interface Context {
  params: Promise<{ nextauth: string[] }>;
}

async function signIn(request: Request, context: Context): Promise<Response> {
  const params = await context.params;
  const ignoresReturnCookie = hasUnreadableReturnCookie(request);
  const response: Response = await NextAuth(new NextRequest(request), { params }, authOptions({ ignoresReturnCookie }));
  if (ignoresReturnCookie) response.headers.append("set-cookie", forgetReturnCookie());
  return response;
}

async function handle(request: Request, context: Context): Promise<Response> {
  try {
    const mended = await mendSignInRequest(request);
    const isAttempt = request.method === "POST" && /\/callback\/credentials\/?$/.test(new URL(request.url).pathname);
    return await (isAttempt ? limitSignIn(mended, (received) => signIn(received, context)) : signIn(mended, context));
  } catch (error) {
    return toResponse(error);
  }
}

export { handle as GET, handle as POST };
