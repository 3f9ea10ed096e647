import type { ReactNode } from "react";
import { requireMember } from "../_server/session";

/**
 * The signed-in frame. It spares a visitor who is signed out a page that would refuse; it guards nothing by itself,
 * since a page renders beside its layout: each query decides. The running head is `BenchHead`, which each page or
 * study layout renders with its own trail.
 */
export default async function BenchLayout({ children }: { children: ReactNode }) {
  await requireMember();
  return children;
}
