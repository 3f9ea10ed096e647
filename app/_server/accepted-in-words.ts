import type { z } from "zod";

type RawIssue = Parameters<z.core.$ZodErrorMap>[0];
type Issue = z.core.$ZodIssue;

/**
 * What a place in a request must hold and what it held instead, as the end of a sentence that begins with the
 * place: "must be a number, and is the text “3.2”". Given to `safeParse` as its error map; messages that a schema
 * states itself go before it.
 */
export function acceptedInWords(issue: RawIssue): string | undefined {
  switch (issue.code) {
    case "invalid_type":
    case "invalid_value":
    case "invalid_union": {
      const accepted = alternatives(acceptedOf(issue));
      const found = foundAt(issue);
      if (accepted === "") return undefined;
      return found === undefined
        ? `is missing; it must be ${accepted}`
        : `must be ${accepted}, and is ${foundInWords(found)}`;
    }
    case "too_small":
      return sizeInWords(
        issue.origin,
        `${issue.minimum}`,
        issue.inclusive === false ? "above" : "from",
        issue.input,
      );
    case "too_big":
      return sizeInWords(
        issue.origin,
        `${issue.maximum}`,
        issue.inclusive === false ? "below" : "up-to",
        issue.input,
      );
    case "invalid_key":
      return "cannot be used as a name; write another";
    case "unrecognized_keys":
      return `holds ${issue.keys.map(quoted).join(", ")}, which nothing reads; check the spelling`;
    default:
      return undefined;
  }
}

/** "a number"; "“fitted”", "“none”": what may stand here, nothing where the alternatives cannot be described. */
function acceptedOf(issue: RawIssue | Issue): string[] {
  if (issue.code === "invalid_type") return listed(TYPES[issue.expected]);
  if (issue.code === "invalid_value") return issue.values.map(valueInWords);
  if (issue.code !== "invalid_union") return [];
  if ("options" in issue && Array.isArray(issue.options)) return issue.options.map(valueInWords);
  const each = issue.errors.flatMap(([first]) => {
    if (first === undefined) return [];
    return first.path.length > 0 ? listed(TYPES.object) : acceptedOf(first);
  });
  return [...new Set(each)];
}

function listed(one: string | undefined): string[] {
  return one === undefined ? [] : [one];
}

/** The value at fault; of objects that differ in one field, that field's. */
function foundAt(issue: RawIssue): unknown {
  const { input } = issue;
  if (issue.code !== "invalid_union" || issue.discriminator === undefined) return input;
  return typeof input === "object" && input !== null ? Reflect.get(input, issue.discriminator) : input;
}

const TYPES: Readonly<Record<string, string>> = {
  number: "a number",
  int: "a whole number",
  string: "a text",
  boolean: "true or false",
  array: "a list",
  tuple: "a list",
  object: "an object with named fields",
  record: "an object with named fields",
};

type Bound = "from" | "above" | "up-to" | "below";

function sizeInWords(origin: string, bound: string, kind: Bound, input: unknown): string | undefined {
  const unit = COUNTED[origin];
  if (unit !== undefined) {
    const wanted = kind === "from" || kind === "above" ? "at least" : "at most";
    const found = Array.isArray(input) || typeof input === "string" ? `, and holds ${input.length}` : "";
    return `must hold ${wanted} ${bound} ${bound === "1" ? unit.one : unit.many}${found}`;
  }
  if (origin !== "number" && origin !== "int") return undefined;
  const limit = bound.replace("-", "\u2212");
  const found = typeof input === "number" ? `, and is ${String(input).replace("-", "\u2212")}` : "";
  return `must be ${{ from: `${limit} or more`, above: `above ${limit}`, "up-to": `${limit} or less`, below: `below ${limit}` }[kind]}${found}`;
}

const COUNTED: Readonly<Record<string, { readonly one: string; readonly many: string }>> = {
  array: { one: "entry", many: "entries" },
  string: { one: "character", many: "characters" },
};

/** Long enough to recognise a cell of a table by. */
const MOST_CHARACTERS = 40;

function foundInWords(input: unknown): string {
  if (input === null) return "empty (null)";
  if (Array.isArray(input)) return "a list";
  if (typeof input === "string")
    return `the text ${quoted(input.length > MOST_CHARACTERS ? `${input.slice(0, MOST_CHARACTERS)}…` : input)}`;
  if (typeof input === "number")
    return Number.isFinite(input) ? `the number ${input}` : "not a finite number";
  if (typeof input === "boolean") return `${input}`;
  return "an object";
}

function valueInWords(value: unknown): string {
  return typeof value === "string" ? quoted(value) : String(value);
}

function quoted(text: string): string {
  return `“${text}”`;
}

function alternatives(all: readonly string[]): string {
  const last = all.at(-1) ?? "";
  return all.length < 2 ? last : `${all.slice(0, -1).join(", ")} or ${last}`;
}
