import { performance } from "node:perf_hooks";
import { parseArgs } from "node:util";
import type { AnySection, SectionReport } from "./section";
import { SECTIONS, sectionNamed } from "./sections";
import { simulateOnWorkers } from "./simulate-on-workers";

/**
 * `pnpm bench:validity [section…] [--replicates n] [--json]`: how often the library's intervals hold what they promise,
 * by simulation with known truth. Tables on standard output, progress on standard error, exit status 1 where a
 * cell fails.
 */
async function main(): Promise<void> {
  const { values, positionals } = parseArgs({
    allowPositionals: true,
    options: { replicates: { type: "string" }, json: { type: "boolean", default: false } },
  });
  const chosen = positionals.length === 0 ? SECTIONS : positionals.map(sectionOrRefuse);
  const replicates = values.replicates === undefined ? null : replicatesOf(values.replicates);
  const failures: string[] = [];
  const reports: Record<string, unknown> = {};
  for (const section of chosen) {
    const count = replicates ?? section.replicates;
    const report = await measured(section, count);
    failures.push(...report.failures.map((failure) => `${section.name}: ${failure}`));
    reports[section.name] = { replicates: count, figures: report.figures, failures: report.failures };
    if (!values.json) process.stdout.write(`${headOf(section, count)}\n\n${report.markdown}\n\n`);
  }
  if (values.json) process.stdout.write(`${JSON.stringify({ sections: reports, failures })}\n`);
  else process.stdout.write(`${conclusion(failures)}\n`);
  if (failures.length > 0) process.exitCode = 1;
}

async function measured(section: AnySection, replicates: number): Promise<SectionReport> {
  const start = performance.now();
  let shown = -1;
  const columns = await simulateOnWorkers(section, replicates, (done, of) => {
    const tenth = Math.floor((10 * done) / of);
    if (tenth === shown) return;
    shown = tenth;
    process.stderr.write(`${section.name}: ${10 * tenth} % after ${seconds(start)} s\n`);
  });
  return section.report(columns, replicates);
}

function seconds(start: number): string {
  return ((performance.now() - start) / 1000).toFixed(0);
}

function headOf({ title, cellNames, replicates, reason }: AnySection, count: number): string {
  const why = reason !== null && count === replicates ? ` (${reason})` : "";
  return `## ${title}\n\n${cellNames.length} cells of ${count} replicates each${why}.`;
}

function conclusion(failures: readonly string[]): string {
  if (failures.length === 0) return "Every cell holds.";
  return `Failed, ${failures.length}:\n\n${failures.map((failure) => `- ${failure}`).join("\n")}`;
}

function sectionOrRefuse(name: string): AnySection {
  const section = sectionNamed(name);
  if (section === null)
    refuse(`There is no section ${name}; there are ${SECTIONS.map((one) => one.name).join(", ")}.`);
  return section;
}

function replicatesOf(text: string): number {
  const count = Number(text);
  if (!Number.isInteger(count) || count < 1)
    refuse(`--replicates takes a whole number of 1 or more, not ${text}.`);
  return count;
}

function refuse(message: string): never {
  process.stderr.write(`${message}\n`);
  process.exit(2);
}

await main();
