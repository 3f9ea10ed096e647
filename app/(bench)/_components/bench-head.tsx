import type { ComponentProps } from "react";
import { RunningHead } from "@/app/_ui/running-head";
import { MemberMenu } from "./member-menu";

type Head = Pick<ComponentProps<typeof RunningHead>, "trail" | "aside" | "actions">;

/** The running head of every signed-in page: where you are, the page's own actions, and the member's menu. */
export function BenchHead({
  person,
  trail,
  aside,
  actions,
}: Head & { person: { readonly name: string; readonly initials: string; readonly role: string } }) {
  return (
    <RunningHead
      home="/studies"
      trail={trail ?? []}
      aside={aside}
      actions={
        <>
          {actions}
          <MemberMenu {...person} />
        </>
      }
    />
  );
}
