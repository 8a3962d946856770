import NextAuth from "next-auth";
import { NextRequest } from "next/server";
import { authOptions } from "@/app/_server/auth";
import { limitSignIn } from "@/app/_server/limit-sign-in";

interface Context {
  params: Promise<{ nextauth: string[] }>;
}

async function handle(request: Request, context: Context): Promise<Response> {
  const params = await context.params;
  return NextAuth(new NextRequest(request), { params }, authOptions());
}

async function handlePost(request: Request, context: Context): Promise<Response> {
  const isSignIn = (await context.params).nextauth.join("/") === "callback/credentials";
  return isSignIn ? limitSignIn(request, (received) => handle(received, context)) : handle(request, context);
}

export { handle as GET, handlePost as POST };
