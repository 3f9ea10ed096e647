import { cookies } from "next/headers";
import type { ComponentProps } from "react";
import { requireMember } from "@/app/_server/session";
import { RunningHead } from "@/app/_ui/running-head";
import { THEME_COOKIE, themeOf } from "@/app/_ui/theme";
import { MemberMenu } from "./_components/member-menu";

/**
 * The running head of every signed-in page: where you are, the page's own actions, and the member's menu. Rendered
 * by each page outside studies and by the layout of a study, since only they know their trail.
 */
export async function BenchHead({
  trail,
  aside,
  actions,
}: Pick<ComponentProps<typeof RunningHead>, "trail" | "aside" | "actions">) {
  const { name, initials, role } = await requireMember();
  const theme = themeOf((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <RunningHead
      home="/studies"
      trail={trail ?? []}
      aside={aside}
      actions={
        <>
          {actions}
          <MemberMenu name={name} initials={initials} role={role} theme={theme} />
        </>
      }
    />
  );
}
