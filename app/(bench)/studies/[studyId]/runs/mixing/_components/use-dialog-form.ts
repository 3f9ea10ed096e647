"use client";

import { type FormEvent, useState, useTransition } from "react";
import type { ActionResult } from "@/app/_server/action-result";
import type { ChangedLaw } from "@/app/_server/study-change";
import { useMixingChange } from "./mixing-change";

/** A form of a dialog that closes when what it says was kept, and else shows what was refused, box by box. */
export function useDialogForm<Form>(
  before: Form,
  keep: (form: Form) => Promise<ActionResult<ChangedLaw>>,
  onClose: () => void,
) {
  const { announce } = useMixingChange();
  const [form, setForm] = useState(before);
  const [faults, setFaults] = useState<Readonly<Record<string, string>>>({});
  const [message, setMessage] = useState<string | null>(null);
  const [working, start] = useTransition();

  function onSubmit(event: FormEvent) {
    event.preventDefault();
    start(async () => {
      const result = await keep(form);
      if (result.ok) {
        announce(result.value);
        onClose();
        return;
      }
      setMessage(result.message);
      setFaults(Object.fromEntries((result.fields ?? []).map(({ path, message: text }) => [path, text])));
    });
  }

  const change = (part: Partial<Form>) => setForm((now) => ({ ...now, ...part }));
  return { form, change, faults, message, working, onSubmit };
}
