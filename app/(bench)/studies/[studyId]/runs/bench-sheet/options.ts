import { z } from "zod";
import { ORDERS, type Order } from "./measuring-order";

/** How a bench sheet is drawn up. It stands in the address, so that the same address prints the same sheet. */
export interface BenchOptions {
  readonly order: Order;
  readonly seed: number;
  /** Stock that is added last and starts the reaction; "" for the usual choice. */
  readonly starts: string;
  readonly blank: boolean;
  readonly cautions: boolean;
}

export const USUAL_OPTIONS: BenchOptions = {
  order: "least",
  seed: 1,
  starts: "",
  blank: true,
  cautions: true,
};

const query = z.object({
  order: z.enum(ORDERS).catch(USUAL_OPTIONS.order),
  seed: z.coerce.number().int().min(0).max(1_000_000).catch(USUAL_OPTIONS.seed),
  starts: z.string().max(64).catch(""),
  blank: z.enum(["0", "1"]).catch("1"),
  cautions: z.enum(["0", "1"]).catch("1"),
});

/** What is not read is as usual. */
export function readOptions(
  parameters: Readonly<Record<string, string | string[] | undefined>>,
): BenchOptions {
  const { blank, cautions, ...rest } = query.parse(parameters);
  return { ...rest, blank: blank === "1", cautions: cautions === "1" };
}

/** The query of the address, without what is as usual; "" where all is. */
export function optionsQuery(options: BenchOptions): string {
  const parts = new URLSearchParams();
  if (options.order !== USUAL_OPTIONS.order) parts.set("order", options.order);
  if (options.order === "random") parts.set("seed", String(options.seed));
  if (options.starts !== "") parts.set("starts", options.starts);
  if (!options.blank) parts.set("blank", "0");
  if (!options.cautions) parts.set("cautions", "0");
  const text = parts.toString();
  return text === "" ? "" : `?${text}`;
}
