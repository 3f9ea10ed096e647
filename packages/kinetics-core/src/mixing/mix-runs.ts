import { compositionOf } from "./composition";
import type {
  Device,
  ErrorSource,
  MixedRow,
  MixedSolution,
  Mixing,
  MixingInput,
  Portion,
  RefusedRow,
  Stock,
  Total,
} from "./mixing";
import { mixed, type Propagated } from "./propagate";
import { deviceFault, refused, stockFault, totalVolumeOf } from "./row-faults";

/**
 * Concentrations at mixing time of every run and of every solution on the way, with what each error source does to them.
 * A row that cannot be computed is refused by name, with a sentence, and so are the rows made from it; the others stand.
 * Nothing is thrown.
 */
export function mixRuns(input: MixingInput): Mixing {
  const bench = new Bench(input);
  const solutions = input.solutions.map((solution, index) => bench.solutionRow(solution, index));
  const labels = new Set<string>();
  const runs = input.runs.map((run) => {
    if (labels.has(run.label))
      return refused(
        run.label,
        "name-twice",
        `More than one run is called ${run.label}. Give each run a label of its own.`,
      );
    labels.add(run.label);
    return bench.runRow(run.label, run.portions, run.total);
  });
  return {
    species: bench.species,
    sources: bench.sources,
    runs,
    solutions,
    refusedDevices: bench.refusedDevices,
  };
}

type Solved = Propagated & { readonly totalVolume: number | null };

/** One call's solutions, solved when a row first draws from them, and the sources found on the way. */
class Bench {
  readonly species: readonly string[];
  readonly sources: ErrorSource[] = [];
  readonly refusedDevices: readonly RefusedRow[];
  private readonly solutions: ReadonlyMap<string, Stock | MixedSolution>;
  private readonly devices: ReadonlyMap<string, Device>;
  private readonly deviceNames: ReadonlySet<string>;
  private readonly deviceSources = new Map<string, number>();
  private readonly solved = new Map<string, Solved | RefusedRow>();
  private readonly underWay = new Set<string>();
  private readonly charges: MixingInput["charges"];

  constructor({ solutions, devices = [], charges }: MixingInput) {
    this.species = [
      ...new Set(
        solutions.flatMap((one) =>
          one.kind === "stock" ? one.solutes.flatMap((solute) => Object.keys(solute.species)) : [],
        ),
      ),
    ];
    this.charges = charges;
    // The first of a name is the one drawn from; a second is refused where it stands.
    this.solutions = new Map([...solutions].reverse().map((one) => [one.name, one]));
    this.refusedDevices = devices.flatMap((device) => deviceFault(device) ?? []);
    const unfit = new Set(this.refusedDevices.map((row) => row.label));
    const fit = devices.filter((device) => !unfit.has(device.name));
    this.devices = new Map([...fit].reverse().map((device) => [device.name, device]));
    this.deviceNames = new Set(this.devices.keys());
  }

  solutionRow(solution: Stock | MixedSolution, index: number): MixedRow | RefusedRow {
    const { name } = solution;
    if (this.solutions.get(name) !== solution)
      return refused(
        name,
        "name-twice",
        `Solution ${index + 1} is called ${name}, as one before it. Give each solution a name of its own.`,
      );
    return this.row(name, this.solve(solution));
  }

  runRow(label: string, portions: readonly Portion[], total: Total | null): MixedRow | RefusedRow {
    return this.row(
      label,
      this.mixture(label, `Run ${label}`, portions, total, { name: `Volumes of ${label}`, kind: "run" }),
    );
  }

  private row(label: string, solved: Solved | RefusedRow): MixedRow | RefusedRow {
    if ("status" in solved) return { ...solved, label };
    return {
      status: "mixed",
      label,
      ...compositionOf(label, this.species, solved, solved.totalVolume, this.charges),
    };
  }

  private solve(solution: Stock | MixedSolution): Solved | RefusedRow {
    const { name } = solution;
    const known = this.solved.get(name);
    if (known !== undefined) return known;
    if (this.underWay.has(name))
      return refused(
        name,
        "made-from-itself",
        `Solution ${name} is made from itself, directly or through others. Correct what it is made from.`,
      );
    this.underWay.add(name);
    const solved =
      solution.kind === "stock"
        ? (stockFault(solution) ?? this.stock(solution))
        : this.mixture(name, `Solution ${name}`, solution.portions, solution.total, {
            name: `Dilution ${name}`,
            kind: "step",
          });
    this.underWay.delete(name);
    this.solved.set(name, solved);
    return solved;
  }

  private stock({ name, solutes }: Stock): Solved {
    const concentrations = new Float64Array(this.species.length);
    const effects = new Map<number, Float64Array>();
    for (const solute of solutes) {
      const { value, standardUncertainty } = solute.concentration;
      const effect = new Float64Array(this.species.length);
      for (const [species, count] of Object.entries(solute.species)) {
        const i = this.species.indexOf(species);
        concentrations[i] = (concentrations[i] ?? 0) + count * value;
        effect[i] = count * standardUncertainty;
      }
      if (standardUncertainty > 0)
        effects.set(
          this.newSource({
            name: solutes.length === 1 ? `Stock ${name}` : `Stock ${name}, ${solute.name}`,
            kind: "stock",
          }),
          effect,
        );
    }
    return { concentrations, effects, totalVolume: null };
  }

  private mixture(
    label: string,
    what: string,
    portions: readonly Portion[],
    total: Total | null,
    source: ErrorSource,
  ): Solved | RefusedRow {
    const totalVolume = totalVolumeOf(label, what, portions, total, this.deviceNames);
    if (typeof totalVolume !== "number") return totalVolume;
    const parts: { portion: Portion; from: Propagated | null }[] = [];
    for (const portion of portions) {
      if (portion.solution === null) {
        parts.push({ portion, from: null });
        continue;
      }
      const solution = this.solutions.get(portion.solution);
      if (solution === undefined)
        return refused(
          label,
          "stock-missing",
          `${what} draws from ${portion.solution}, which is not among the solutions. Add it, or correct the name.`,
        );
      const from = this.solve(solution);
      if ("status" in from) return refusedWith(label, what, from);
      parts.push({ portion, from });
    }
    const book = {
      ownSource: () => this.newSource(source),
      deviceSource: (device: string) => this.deviceSource(device),
    };
    return {
      ...mixed(this.species.length, parts, total ?? { kind: "sum" }, totalVolume, book),
      totalVolume,
    };
  }

  private newSource(source: ErrorSource): number {
    return this.sources.push(source) - 1;
  }

  private deviceSource(name: string): { readonly source: number; readonly relative: number } | null {
    const relative = this.devices.get(name)?.relative ?? 0;
    if (relative === 0) return null;
    const source =
      this.deviceSources.get(name) ?? this.newSource({ name: `Calibration of ${name}`, kind: "device" });
    this.deviceSources.set(name, source);
    return { source, relative };
  }
}

/** A row fails with what it draws from, and says the reason at the root of it. */
function refusedWith(label: string, what: string, cause: RefusedRow): RefusedRow {
  if (cause.code === "made-from-itself") return { ...cause, label };
  const reason =
    cause.code === "stock-refused" ? cause.message.slice(cause.message.indexOf(": ") + 2) : cause.message;
  return refused(label, "stock-refused", `${what} draws from a solution that cannot be used: ${reason}`);
}
