import type { ReactNode } from "react";

const MARKUP =
  /\^\{([^}]*)\}|\^([-−+]?\d+(?:\.\d+)?)|(?<=[*\])])_\{([^}]*)\}|(?<=[*\])])_([A-Za-z0-9]+)|\*([^*\s][^*]*)\*/g;

/**
 * Prose inside an SVG <text>: raised and lowered parts are shifted spans, and the next span shifts back, since `dy`
 * carries on. Same marks as the page's Prose.
 */
export function SvgProse({ text }: { text: string }) {
  const nodes: ReactNode[] = [];
  let from = 0;
  let back = 0;
  const plain = (piece: string, key: string) => {
    if (piece === "") return;
    nodes.push(
      <tspan key={key} dy={back === 0 ? undefined : `${back}em`}>
        {piece}
      </tspan>,
    );
    back = 0;
  };
  for (const match of text.matchAll(MARKUP)) {
    plain(text.slice(from, match.index), `${match.index}-before`);
    const raised = match[1] ?? match[2];
    const lowered = match[3] ?? match[4];
    const shift = raised !== undefined ? -0.55 : 0.3;
    const piece = (raised ?? lowered ?? "").replace("-", "−");
    if (piece !== "") {
      nodes.push(
        <tspan key={match.index} dy={`${shift + back / SMALL}em`} fontSize={`${SMALL}em`}>
          {piece}
        </tspan>,
      );
      back = -shift * SMALL;
    } else {
      nodes.push(
        <tspan key={match.index} fontStyle="italic" dy={back === 0 ? undefined : `${back}em`}>
          {match[5]}
        </tspan>,
      );
      back = 0;
    }
    from = match.index + match[0].length;
  }
  plain(text.slice(from), "end");
  return <>{nodes}</>;
}

/** Size of a raised or lowered part; its `dy` counts in its own, smaller em. */
const SMALL = 0.72;
