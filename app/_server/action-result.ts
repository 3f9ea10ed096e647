/**
 * What an action gives back to the page that called it. A refusal is an expected outcome with a sentence for the
 * reader; `fields` names the inputs concerned by path ("species.0.name").
 */
export type ActionResult<Value> =
  | { readonly ok: true; readonly value: Value }
  | { readonly ok: false; readonly message: string; readonly fields?: readonly FieldMessage[] };

export interface FieldMessage {
  readonly path: string;
  readonly message: string;
}

export function done<Value>(value: Value): ActionResult<Value> {
  return { ok: true, value };
}

export function refused(message: string, fields?: readonly FieldMessage[]): ActionResult<never> {
  return fields === undefined ? { ok: false, message } : { ok: false, message, fields };
}
