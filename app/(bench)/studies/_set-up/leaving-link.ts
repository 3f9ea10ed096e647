/** What of a click on a link decides where it leads. */
export interface LinkClick {
  readonly button: number;
  readonly modified: boolean;
  readonly href: string;
  readonly target: string;
  readonly download: boolean;
}

/**
 * The address on this site to which a click would take this very page, as path, query and fragment; null where the
 * page stays (another tab, a download, a place on the page) or the browser asks by itself (another site).
 */
export function leavingAddress(click: LinkClick, here: string): string | null {
  const opensElsewhere =
    click.button !== 0 || click.modified || (click.target !== "" && click.target !== "_self");
  if (opensElsewhere || click.download || !URL.canParse(click.href, here)) return null;
  const from = new URL(here);
  const to = new URL(click.href, here);
  if (to.origin !== from.origin || to.pathname === from.pathname) return null;
  return `${to.pathname}${to.search}${to.hash}`;
}
