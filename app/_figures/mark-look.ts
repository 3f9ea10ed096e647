import type { RunMark } from "@/app/_worksheet/analysis";

export type MarkForm =
  | "triangle-down"
  | "bowtie"
  | "diamond"
  | "hexagon"
  | "square"
  | "cross"
  | "star"
  | "triangle-up"
  | "ring";

export type MarkFill = "solid" | "open" | "open-dot";

export interface MarkLook {
  readonly form: MarkForm;
  readonly fill: MarkFill;
  /** A CSS colour over the tokens, right in light and dark. */
  readonly colour: string;
}

const FORMS: readonly (readonly MarkForm[])[] = [
  ["triangle-down", "diamond", "square", "triangle-up"],
  // Five levels of which the middle one is the base recipe keep the four forms about it.
  ["triangle-down", "diamond", "hexagon", "square", "triangle-up"],
  ["triangle-down", "bowtie", "diamond", "square", "cross", "triangle-up"],
  ["triangle-down", "bowtie", "diamond", "hexagon", "square", "cross", "star", "triangle-up"],
];

/** Form, fill and colour of a run: form and contrast with the paper rise with the level. */
export function lookOfMark(mark: RunMark, setAside = false): MarkLook {
  if (setAside) return { form: "diamond", fill: "open", colour: "var(--ink-3)" };
  if (mark.series === "base") return { form: "ring", fill: "open-dot", colour: "var(--base)" };
  const fill = mark.series === "first" ? "solid" : mark.series === "second" ? "open" : "open-dot";
  const ramp = mark.series === "second" ? "warm" : "cool";
  return { form: formOfLevel(mark), fill, colour: colourOfLevel(ramp, mark) };
}

function formOfLevel({ level, levels }: RunMark): MarkForm {
  const forms = FORMS.find((candidate) => candidate.length >= levels) ?? FORMS[FORMS.length - 1] ?? [];
  // Fewer levels than forms spread over them, lowest and highest always at the ends; more levels share forms.
  const place = levels <= 1 ? 0.5 : level / (levels - 1);
  return forms[Math.round(place * (forms.length - 1))] ?? "square";
}

function colourOfLevel(ramp: "cool" | "warm", { level, levels }: RunMark): string {
  const place = levels <= 1 ? 2 : (level / (levels - 1)) * 4;
  const below = Math.floor(place);
  const share = place - below;
  if (levels <= 5 || share < 0.05) return `var(--${ramp}-${Math.round(place) + 1})`;
  return `color-mix(in oklab, var(--${ramp}-${below + 2}) ${Math.round(share * 100)}%, var(--${ramp}-${below + 1}))`;
}
