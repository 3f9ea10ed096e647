import type { RunMark as RunMarkSpec } from "@/app/_worksheet/analysis";
import { MarkShape } from "../_figures/mark-shape";

export type RunState = "standing" | "set-aside" | "without-rate";

/** A run's mark and name, the same everywhere: colour, shape and label. Set aside is struck through once, legible. */
export function RunMark({ mark, label, state }: { mark: RunMarkSpec; label: string; state: RunState }) {
  return (
    <span className={state === "set-aside" ? "run-name set-aside" : "run-name"}>
      <svg width="16" height="16" viewBox="0 0 16 16" aria-hidden="true">
        <MarkShape mark={mark} setAside={state === "set-aside"} x={8} y={8} />
      </svg>
      <span>{label}</span>
      {state === "set-aside" && <span className="sr-only">, set aside</span>}
    </span>
  );
}
