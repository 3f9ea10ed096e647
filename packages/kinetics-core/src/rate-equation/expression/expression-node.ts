import type { Span } from "./expression-fault";

/** An expression as read: what stands where, nothing yet computed. */
export type ExpressionNode = Span &
  (
    | { readonly kind: "number"; readonly value: number }
    | { readonly kind: "species"; readonly name: string }
    | { readonly kind: "parameter"; readonly name: string }
    | { readonly kind: "negative"; readonly of: ExpressionNode }
    | { readonly kind: "function"; readonly name: ExpressionFunction; readonly of: ExpressionNode }
    | {
        readonly kind: "operation";
        readonly operator: ExpressionOperator;
        readonly left: ExpressionNode;
        readonly right: ExpressionNode;
      }
  );

export type ExpressionOperator = "+" | "-" | "*" | "/" | "^";

export type ExpressionFunction = "exp" | "ln" | "log10" | "sqrt";

/** Functions with a derivative wherever they have a value; a fit can follow no other. */
export const EXPRESSION_FUNCTIONS: readonly ExpressionFunction[] = ["exp", "ln", "log10", "sqrt"];

/** Names of the parameters in the order in which they stand in the text. */
export function parametersIn(node: ExpressionNode): readonly string[] {
  return [...new Set(leaves(node).flatMap((leaf) => (leaf.kind === "parameter" ? [leaf.name] : [])))];
}

/** Names of the species, each once. */
export function speciesIn(node: ExpressionNode): ReadonlySet<string> {
  return new Set(leaves(node).flatMap((leaf) => (leaf.kind === "species" ? [leaf.name] : [])));
}

/** Where the parameter stands first. */
export function parameterNamed(node: ExpressionNode, name: string): ExpressionNode | null {
  return leaves(node).find((leaf) => leaf.kind === "parameter" && leaf.name === name) ?? null;
}

function leaves(node: ExpressionNode): readonly ExpressionNode[] {
  switch (node.kind) {
    case "operation":
      return [...leaves(node.left), ...leaves(node.right)];
    case "negative":
    case "function":
      return leaves(node.of);
    default:
      return [node];
  }
}
