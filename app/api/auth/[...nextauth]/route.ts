import type { NextRequest } from "next/server";
import NextAuth from "next-auth";
import { authOptions } from "@/app/_server/auth-options";
import { env } from "@/app/_server/env";
import { problem } from "@/app/_server/problem";
import { isSameOrigin } from "@/app/_server/same-origin";

interface Context {
  readonly params: Promise<{ nextauth: string[] }>;
}

export function GET(request: NextRequest, context: Context): Promise<Response> {
  return NextAuth(request, context, authOptions());
}

export async function POST(request: NextRequest, context: Context): Promise<Response> {
  if (!isSameOrigin(request.headers, env.publicOrigin)) {
    return problem(403, "This came from another address than the server's own pages.");
  }
  return NextAuth(request, context, authOptions());
}
