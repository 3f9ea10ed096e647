"use client";

import { useRef, useState } from "react";
import { Button } from "@/app/_ui/button";
import { Choice, Field, Select } from "@/app/_ui/field";
import { Notice } from "@/app/_ui/notice";
import { SectionTitle } from "@/app/_ui/sheet";
import { makeLink } from "../actions";
import { LINK_LIVES } from "../schema";

/** Makes a link and shows its address, once: only its hash is kept. */
export function NewLink({ studyId, revision }: { studyId: string; revision: number }) {
  const [pending, setPending] = useState(false);
  const [address, setAddress] = useState<string | null>(null);
  const [message, setMessage] = useState<string | null>(null);

  async function submit(form: FormData) {
    setPending(true);
    setMessage(null);
    const result = await makeLink({
      studyId,
      label: String(form.get("label") ?? ""),
      life: String(form.get("life")),
      shows: String(form.get("shows")),
      revision,
    });
    setPending(false);
    if (result.ok) setAddress(new URL(result.value.path, window.location.origin).href);
    else setMessage(result.message);
  }

  return (
    <section>
      <SectionTitle>New link</SectionTitle>
      {/* onSubmit rather than an action: the form keeps what was typed when the link is refused. */}
      <form
        className="grid max-w-[640px] gap-4"
        onSubmit={(event) => {
          event.preventDefault();
          void submit(new FormData(event.currentTarget));
        }}
      >
        <div className="grid gap-4 sm:grid-cols-2">
          <Field
            label="For whom"
            name="label"
            maxLength={120}
            hint="A note for the group; the reader does not see it."
          />
          <Select label="Works for" name="life" defaultValue="30">
            {Object.entries(LINK_LIVES).map(([life, words]) => (
              <option key={life} value={life}>
                {words}
              </option>
            ))}
          </Select>
        </div>
        <fieldset className="grid gap-1">
          <legend className="field-label">Shows</legend>
          <Choice
            type="radio"
            name="shows"
            value="live"
            defaultChecked
            label="The study as it stands"
            note="Follows every change."
          />
          <Choice
            type="radio"
            name="shows"
            value="frozen"
            label={`Revision ${revision}, frozen`}
            note="Stays as it is now."
          />
        </fieldset>
        <div>
          <Button type="submit" kind="primary" disabled={pending}>
            {pending ? "Making the link" : "Make a link"}
          </Button>
        </div>
      </form>
      {message !== null && (
        <div className="mt-4">
          <Notice severity="blocks" title="No link was made">
            {message}
          </Notice>
        </div>
      )}
      {address !== null && <NewAddress address={address} />}
    </section>
  );
}

function NewAddress({ address }: { address: string }) {
  const box = useRef<HTMLInputElement>(null);
  const [copied, setCopied] = useState(false);

  async function copy() {
    // The clipboard is closed on plain http; then the address is selected for the reader's own copy.
    try {
      await navigator.clipboard.writeText(address);
      setCopied(true);
    } catch {
      box.current?.select();
    }
  }

  return (
    <div className="mt-4 max-w-[640px]">
      <Notice severity="holds" title="The link is made">
        Whoever has this address can read the study. Copy it now: it is shown this once.
        <div className="mt-3 flex items-end gap-2">
          <div className="min-w-0 flex-1">
            <Field
              ref={box}
              label="Address"
              readOnly
              value={address}
              onFocus={(event) => event.target.select()}
            />
          </div>
          <Button onClick={() => void copy()}>{copied ? "Copied" : "Copy the address"}</Button>
        </div>
      </Notice>
    </div>
  );
}
