"use client";

import { useRouter } from "next/navigation";
import { type FormEvent, useState, useTransition } from "react";
import { Button, ButtonLink } from "@/app/_ui/button";
import { Disclosure } from "@/app/_ui/disclosure";
import { Field, Select } from "@/app/_ui/field";
import { Margin, MarginSection } from "@/app/_ui/margin";
import { Notice } from "@/app/_ui/notice";
import { SectionTitle, Sheet } from "@/app/_ui/sheet";
import { Cautions } from "../../_set-up/cautions";
import { ReactionField } from "../../_set-up/reaction-field";
import type { FormFault } from "../../_set-up/read-set-up-form";
import { emptySetUpForm } from "../../_set-up/set-up-form";
import type { SetUpForm } from "../../_set-up/set-up-form.schema";
import { SignalFields } from "../../_set-up/signal-fields";
import { SpeciesTable } from "../../_set-up/species-table";
import { makeStudy } from "../actions";

/** The least that a study needs; the rest has sensible values and waits in Set-up. `next` follows the study's address. */
export function NewStudyForm({ next }: { next: string }) {
  const router = useRouter();
  const [form, setForm] = useState<SetUpForm>(emptySetUpForm);
  const [faults, setFaults] = useState<readonly FormFault[]>([]);
  const [refusal, setRefusal] = useState<string | null>(null);
  const [making, start] = useTransition();
  const change = (part: Partial<SetUpForm>) => setForm((earlier) => ({ ...earlier, ...part }));
  const faultOf = (path: string) => faults.find((fault) => fault.path === path)?.message;
  const changing = form.species.filter((row) => row.stoichiometricNumber !== 0);
  const followed = form.species.find((row) => row.followed);
  const inLaw = form.species.filter((row) => row.inLaw);

  function onSubmit(event: FormEvent) {
    event.preventDefault();
    start(async () => {
      const result = await makeStudy(form);
      if (result.ok) {
        router.push(`/studies/${result.value.studyId}${next}`);
        return;
      }
      setFaults(result.fields ?? []);
      setRefusal(result.message);
    });
  }

  return (
    <Sheet
      title="New study"
      lead="A name and a reaction are enough to begin. Everything can be changed in Set-up later."
      margin={
        <Margin label="Cautions">
          <Cautions form={form} />
          <MarginSection title="How a reaction is written">
            <dl className="fact-list">
              <dt>Symbol</dt>
              <dd>OH- [B]: the law says [B]</dd>
              <dt>Charge</dt>
              <dd>SO4^2-, Fe^3+, OH-</dd>
              <dt>Hydrate</dt>
              <dd>CuSO4·5H2O</dd>
              <dt>Name</dt>
              <dd>dye [D], "4-nitrophenol" [N]</dd>
              <dt>Arrow</dt>
              <dd>-&gt; or &lt;=&gt;</dd>
            </dl>
          </MarginSection>
        </Margin>
      }
    >
      <form onSubmit={onSubmit} noValidate>
        <div className="mb-5 max-w-[640px]">
          <Field
            label="Name"
            value={form.name}
            maxLength={160}
            placeholder="Alkaline hydrolysis of 4-nitrophenyl acetate"
            error={faultOf("name")}
            onChange={(event) => change({ name: event.target.value })}
          />
        </div>
        <ReactionField
          value={form.reaction}
          species={form.species}
          onChange={(reaction, species) => change(species === null ? { reaction } : { reaction, species })}
        />
        {form.species.length > 0 && (
          <section className="mt-6">
            <SectionTitle
              note={
                inLaw.length === 0
                  ? "none stands in the law yet"
                  : `${inLaw.map(({ symbol }) => symbol).join(", ")} stand in the law`
              }
            >
              Species
            </SectionTitle>
            <div className="mb-3 grid max-w-[640px] grid-cols-2 gap-5 phone:grid-cols-1">
              <Select
                label="Followed species"
                value={form.species.findIndex((row) => row.followed)}
                onChange={(event) => {
                  const chosen = Number(event.target.value);
                  change({
                    species: form.species.map((row, index) => ({ ...row, followed: index === chosen })),
                  });
                }}
              >
                {changing.map((row) => (
                  <option key={form.species.indexOf(row)} value={form.species.indexOf(row)}>
                    {[row.symbol, row.name || row.formula].filter(Boolean).join(", ")}
                  </option>
                ))}
              </Select>
            </div>
            <Disclosure
              summary={`Names, units and roles of the ${form.species.length} species`}
              open={faults.some(({ path }) => path.startsWith("species."))}
            >
              <div className="mt-2">
                <SpeciesTable
                  species={form.species}
                  faults={faults}
                  readOnly={false}
                  onChange={(species) => change({ species })}
                />
              </div>
            </Disclosure>
          </section>
        )}
        <section className="mt-6">
          <SectionTitle>Signal</SectionTitle>
          <SignalFields
            signal={form.signal}
            followedName={followed?.name || followed?.symbol || "the followed species"}
            faults={faults}
            readOnly={false}
            onChange={(signal) => change({ signal })}
          />
        </section>
        <section className="mt-6">
          <SectionTitle
            note={
              <>
                printed with every <i>k</i>
              </>
            }
          >
            Conditions
          </SectionTitle>
          <div className="grid max-w-[640px] grid-cols-2 gap-5 phone:gap-x-3">
            <Field
              label="Temperature"
              unit="°C"
              value={form.temperature}
              error={faultOf("temperature")}
              hint="With its standard uncertainty: 25.0 ± 0.1."
              onChange={(event) => change({ temperature: event.target.value })}
            />
            <Field
              label="Solvent"
              value={form.solvent}
              error={faultOf("solvent")}
              onChange={(event) => change({ solvent: event.target.value })}
            />
          </div>
        </section>
        {refusal !== null && (
          <div className="mt-6 max-w-[640px]">
            <Notice severity="blocks" title={refusal}>
              {faults.length > 0 && (
                <ul className="list-disc pl-5">
                  {faults.map(({ path, message }) => (
                    <li key={path}>{message}</li>
                  ))}
                </ul>
              )}
            </Notice>
          </div>
        )}
        <p className="mt-7 flex flex-wrap gap-2">
          <Button kind="primary" type="submit" disabled={making}>
            {making ? "Making the study" : "Make the study"}
          </Button>
          <ButtonLink href="/studies">Cancel</ButtonLink>
        </p>
      </form>
    </Sheet>
  );
}
