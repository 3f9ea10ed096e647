import type { RunMark } from "@/app/_worksheet/analysis";
import { lookOfMark, type MarkForm } from "./mark-look";

/** A run's mark inside an SVG, about 11 px wide at the default `scale`. Set aside: grey outline with one strike. */
export function MarkShape({
  mark,
  setAside = false,
  x,
  y,
  scale = 1,
}: {
  mark: RunMark;
  setAside?: boolean;
  x: number;
  y: number;
  scale?: number;
}) {
  const look = lookOfMark(mark, setAside);
  const solid = look.fill === "solid";
  const stroke = setAside ? 1.3 : solid ? 0.6 : 1.7;
  return (
    <g transform={`translate(${x} ${y}) scale(${scale})`}>
      {look.form === "ring" ? (
        <circle r="5.2" style={{ fill: "var(--sheet)", stroke: look.colour }} strokeWidth="1.7" />
      ) : (
        <path
          d={OUTLINE[look.form]}
          style={{ fill: solid ? look.colour : "var(--sheet)", stroke: look.colour }}
          strokeWidth={stroke}
          strokeLinejoin="round"
        />
      )}
      {look.fill === "open-dot" && <circle r="2.1" style={{ fill: look.colour }} />}
      {setAside && (
        <path d="M-8.4 6.2 8.4-6.2" style={{ stroke: "var(--ink-2)" }} strokeWidth="1.3" fill="none" />
      )}
    </g>
  );
}

const OUTLINE: Record<Exclude<MarkForm, "ring">, string> = {
  "triangle-down": "M-5.6-4.4h11.2L0 5.3z",
  "triangle-up": "M-5.6 4.4h11.2L0-5.3z",
  diamond: "M0-6.3 6.3 0 0 6.3-6.3 0z",
  square: "M-4.8-4.8h9.6v9.6h-9.6z",
  bowtie: "M-5.6-4.6v9.2L5.6-4.6v9.2z",
  hexagon: "M-2.9-5.1h5.8L5.8 0 2.9 5.1h-5.8L-5.8 0z",
  cross: "M-2-5.6h4V-2h3.6v4H2v3.6h-4V2h-3.6v-4H-2z",
  star: "M0-6.5 1.6-2h4.6L2.5.9 3.9 5.6 0 2.8-3.9 5.6-2.5.9-6.2-2h4.6z",
};
