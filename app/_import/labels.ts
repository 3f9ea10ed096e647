import type { RunContext } from "./reading";

/**
 * Which run a trace belongs to. Names match runs by number ("A_14" is R14); a planned run without a trace takes it,
 * a run that has one keeps it and the new readings become a run of their own.
 */

export interface LabelReading {
  readonly label: string;
  readonly reason: string;
  readonly runId: string | null;
  /** Run of the study whose recipe the new one repeats, when the name matched a run with a trace. */
  readonly repeats: RunContext | null;
}

const NUMBERED =
  /^(?:run|sample|trace|abs|absorbance|signal|cell|lauf|probe|kanal|channel|ch|[a-z])?[\s_.#:-]*0*(\d{1,4})$/i;

/** Labels for the traces of a file, in file order; `stated` by source is taken as it is. */
export function labelTraces(
  traces: readonly { readonly source: string; readonly name: string }[],
  runs: readonly RunContext[],
  stated: Readonly<Record<string, string>>,
): readonly LabelReading[] {
  const byLabel = new Map(runs.map((run) => [run.label.toLowerCase(), run]));
  const byNumber = new Map<number, RunContext>();
  for (const run of runs) {
    const number = trailingNumber(run.label);
    if (number !== null && !byNumber.has(number)) byNumber.set(number, run);
  }
  const used = new Set(runs.map((run) => run.label.toLowerCase()));
  for (const label of Object.values(stated)) used.add(label.toLowerCase());
  const nameCounts = new Map<string, number>();
  for (const { name } of traces) nameCounts.set(name, (nameCounts.get(name) ?? 0) + 1);

  const taken = new Set<string>();
  return traces.map(({ source, name }): LabelReading => {
    const said = stated[source];
    if (said !== undefined) {
      const run = byLabel.get(said.toLowerCase());
      const free = run && !run.hasTrace && !taken.has(run.id) ? run : undefined;
      if (free) taken.add(free.id);
      return { label: free?.label ?? said, reason: "chosen by hand", runId: free?.id ?? null, repeats: null };
    }
    const unique = (nameCounts.get(name) ?? 0) === 1;
    const number = unique ? trailingNumber(name) : null;
    const matched = unique
      ? (byLabel.get(name.toLowerCase()) ?? (number === null ? undefined : byNumber.get(number)))
      : undefined;
    if (matched && !matched.hasTrace && !taken.has(matched.id)) {
      taken.add(matched.id);
      return {
        label: matched.label,
        reason: `“${name}” matches the planned run ${matched.label}`,
        runId: matched.id,
        repeats: null,
      };
    }
    if (matched) {
      const label = claim(freeCopy(matched.label, used), used);
      return {
        label,
        reason: `${matched.label} has a trace already, which stays; these readings become ${label}`,
        runId: null,
        repeats: matched,
      };
    }
    const wanted =
      number !== null ? runLabel(name, number) : unique && isName(name) ? name.slice(0, 40) : null;
    if (wanted !== null && !used.has(wanted.toLowerCase())) {
      return {
        label: claim(wanted, used),
        reason:
          number !== null && wanted !== name.trim()
            ? `number ${number} in “${name}”`
            : "the name in the file",
        runId: null,
        repeats: null,
      };
    }
    const label = claim(nextFree(used), used);
    const why = unique ? `“${name}” names no run` : `“${name}” stands more than once`;
    return {
      label,
      reason: `next free label; ${name === "" ? "the column has no name" : why}`,
      runId: null,
      repeats: null,
    };
  });
}

/** A name of the series kind stays as written, "R01" and "K01"; A is the absorbance: "A1" becomes R1, "A_14" R14. */
function runLabel(name: string, number: number): string {
  return /^[b-z]\d+$/i.test(name.trim()) ? name.trim() : `R${number}`;
}

function trailingNumber(name: string): number | null {
  const match = NUMBERED.exec(name.trim());
  return match?.[1] ? Number(match[1]) : null;
}

/** A name that says which run it is, rather than what was measured. */
function isName(name: string): boolean {
  return (
    name !== "" &&
    !/^(abs|absorbance|a|signal|y|value|values|reading|readings|conductivity|pressure|area|extinktion|absorbanz)$/i.test(
      name,
    )
  );
}

function claim(label: string, used: Set<string>): string {
  used.add(label.toLowerCase());
  return label;
}

function nextFree(used: ReadonlySet<string>): string {
  let number = 1;
  while (used.has(`r${number}`) || used.has(`r${String(number).padStart(2, "0")}`)) number += 1;
  return `R${number}`;
}

/** "R14" taken: "R14 (2)". */
function freeCopy(label: string, used: ReadonlySet<string>): string {
  const base = label.slice(0, 34);
  let copy = 2;
  while (used.has(`${base} (${copy})`.toLowerCase())) copy += 1;
  return `${base} (${copy})`;
}
