"use client";

import { useRouter } from "next/navigation";
import { type ReactNode, useState, useTransition } from "react";
import type { LawPreview } from "@/app/_server/study-change";
import { Button } from "@/app/_ui/button";
import { Dialog } from "@/app/_ui/dialog";
import { Field, Select, TextArea } from "@/app/_ui/field";
import { Margin } from "@/app/_ui/margin";
import { Notice } from "@/app/_ui/notice";
import { Prose } from "@/app/_ui/prose";
import { SectionTitle, Sheet } from "@/app/_ui/sheet";
import { LawBeforeAfter } from "../../../_change/law-preview";
import { useStudyChange } from "../../../_change/use-study-change";
import { Cautions } from "../../../_set-up/cautions";
import { ConditionFields } from "../../../_set-up/condition-fields";
import { LeaveGuard } from "../../../_set-up/leave-guard";
import { rateDefinition } from "../../../_set-up/rate-definition";
import { RateOfReaction } from "../../../_set-up/rate-of-reaction";
import { ReactionField } from "../../../_set-up/reaction-field";
import type { FormFault } from "../../../_set-up/read-set-up-form";
import type { SetUpForm } from "../../../_set-up/set-up-form.schema";
import { SignalFields } from "../../../_set-up/signal-fields";
import { SpeciesTable } from "../../../_set-up/species-table";
import { keepSetUp, previewSetUp } from "../actions";
import { contestedBoxes, mineOverTheirs, sameForm } from "../three-way";
import "./set-up-sheet.css";

interface Conflict {
  readonly revision: number;
  readonly theirs: SetUpForm;
}

/** The whole set-up in boxes. Nothing is kept before its effect on the law was seen. */
export function SetUpSheet({
  studyId,
  revision,
  canEdit,
  title,
  kept,
  followsStandards,
  margin,
}: {
  studyId: string;
  revision: number;
  canEdit: boolean;
  title: string;
  /** The boxes as they are kept at `revision`. */
  kept: SetUpForm;
  /** The signal's factor is the slope of the standards' line. */
  followsStandards: boolean;
  margin: ReactNode;
}) {
  const router = useRouter();
  const { announce, refuse } = useStudyChange(studyId);
  // What the boxes began from: the base of a conflict, and of "Discard".
  const [begun, setBegun] = useState({ revision, form: kept });
  const [form, setForm] = useState(kept);
  const [faults, setFaults] = useState<readonly FormFault[]>([]);
  const [preview, setPreview] = useState<LawPreview | null>(null);
  const [conflict, setConflict] = useState<Conflict | null>(null);
  const [editsCautions, setEditsCautions] = useState(false);
  const [working, start] = useTransition();
  const changed = !sameForm(form, begun.form);

  // Another revision arrived, by this page or another person: boxes that nobody is changing here follow it.
  if (revision > begun.revision && !changed) {
    setBegun({ revision, form: kept });
    setForm(kept);
  }
  const change = (part: Partial<SetUpForm>) => setForm((earlier) => ({ ...earlier, ...part }));
  const faultOf = (path: string) => faults.find((fault) => fault.path === path)?.message;

  function ask() {
    start(async () => {
      const result = await previewSetUp({ studyId, base: begun.revision, form });
      setFaults(result.ok ? [] : (result.fields ?? []));
      if (result.ok) setPreview(result.value);
      else refuse(result.message);
    });
  }

  function keep(wanted: SetUpForm, base: number) {
    start(async () => {
      const result = await keepSetUp({ studyId, base, form: wanted });
      setPreview(null);
      if (!result.ok) {
        setFaults(result.fields ?? []);
        refuse(result.message);
        return;
      }
      if (result.value.status === "conflict") {
        setConflict(result.value);
        return;
      }
      setConflict(null);
      // The page of the new revision carries ids for new rows; the boxes follow it when it arrives.
      setBegun({ revision: (result.value.revision ?? base) - 1, form: wanted });
      setForm(wanted);
      announce(result.value);
    });
  }

  const followed = form.species.find((row) => row.followed);
  return (
    <Sheet
      title={title}
      lead={
        <>
          Everything after this page rests on it. A change here refits every run and shows its effect on{" "}
          <i>k</i> before it is kept.
        </>
      }
      margin={
        <Margin label="Cautions and checks">
          <Cautions form={form}>
            {canEdit && (
              <p className="mt-2.5">
                <Button size="small" onClick={() => setEditsCautions(true)}>
                  Edit cautions
                </Button>
              </p>
            )}
          </Cautions>
          {margin}
        </Margin>
      }
    >
      <section aria-label="Reaction">
        <ReactionField
          value={form.reaction}
          species={form.species}
          readOnly={!canEdit}
          onChange={(reaction, species) => change(species === null ? { reaction } : { reaction, species })}
        />
      </section>
      <section>
        <SectionTitle
          note={
            <>
              what <i>k</i> is defined for
            </>
          }
        >
          Rate of reaction
        </SectionTitle>
        <RateOfReaction definition={rateDefinition(form)} />
      </section>
      <section>
        <SectionTitle note="ν is the stoichiometric number; exactly one species is followed">
          Species
        </SectionTitle>
        <SpeciesTable
          species={form.species}
          faults={faults}
          readOnly={!canEdit}
          onChange={(species) => change({ species })}
        />
      </section>
      <section>
        <SectionTitle note="what the traces hold">Signal</SectionTitle>
        <SignalFields
          signal={form.signal}
          standardsFactor={followsStandards ? kept.signal.perMolar : null}
          followedName={followed?.name || followed?.symbol || "the followed species"}
          faults={faults}
          readOnly={!canEdit}
          onChange={(signal) => change({ signal })}
        />
      </section>
      <section>
        <SectionTitle
          note={
            <>
              printed with every <i>k</i>
            </>
          }
        >
          Conditions
        </SectionTitle>
        <ConditionFields form={form} faults={faults} readOnly={!canEdit} onChange={change} />
      </section>
      <section>
        <SectionTitle>Study</SectionTitle>
        <div className="grid grid-cols-4 gap-x-5 gap-y-3.5 narrow:grid-cols-2">
          <div className="col-span-2">
            <Field
              label="Name"
              value={form.name}
              maxLength={160}
              readOnly={!canEdit}
              error={faultOf("name")}
              onChange={(event) => change({ name: event.target.value })}
            />
          </div>
          <Select
            label="Time is shown in"
            value={form.timeUnit}
            disabled={!canEdit}
            onChange={(event) => {
              const unit = (["s", "min", "h"] as const).find((one) => one === event.target.value);
              if (unit) change({ timeUnit: unit });
            }}
          >
            <option value="s">seconds</option>
            <option value="min">minutes</option>
            <option value="h">hours</option>
          </Select>
        </div>
      </section>
      {canEdit && changed && <LeaveGuard onKeep={ask} />}
      {canEdit && changed && (
        <div className="keep-bar" role="status">
          <span>These changes are not kept yet.</span>
          <span className="flex flex-wrap gap-2">
            <Button
              onClick={() => {
                setForm(begun.form);
                setFaults([]);
              }}
            >
              Discard
            </Button>
            <Button kind="primary" disabled={working} onClick={ask}>
              {working ? "Refitting" : "See the effect and keep"}
            </Button>
          </span>
        </div>
      )}
      <Dialog
        open={preview !== null}
        onOpenChange={(open) => !open && setPreview(null)}
        title="Keep the changed set-up?"
        lead="Every run is refitted with it. The set-up as it was stays in the history."
        actions={
          <>
            <Button onClick={() => setPreview(null)}>Go on editing</Button>
            <Button kind="primary" disabled={working} onClick={() => keep(form, begun.revision)}>
              Keep the set-up
            </Button>
          </>
        }
      >
        {preview !== null && (
          <>
            <LawBeforeAfter before={preview.before} after={preview.after} />
            <p>
              <Prose text={preview.effect} />
            </p>
          </>
        )}
      </Dialog>
      <Dialog
        open={editsCautions}
        onOpenChange={setEditsCautions}
        title="Cautions for this study"
        lead="One line each: what it concerns, a colon, what to mind. The usual cautions for reagents that the reaction names are added by themselves."
        actions={
          <Button kind="primary" onClick={() => setEditsCautions(false)}>
            Done
          </Button>
        }
      >
        <div className="mt-3">
          <TextArea
            label="Cautions"
            rows={6}
            maxLength={4000}
            value={form.hazards}
            placeholder="Acetonitrile, in stock A: flammable vapour, harmful"
            onChange={(event) => change({ hazards: event.target.value })}
          />
        </div>
      </Dialog>
      <ConflictDialog
        conflict={conflict}
        boxes={conflict === null ? [] : contestedBoxes(begun.form, form, conflict.theirs)}
        working={working}
        onTakeTheirs={() => {
          if (conflict === null) return;
          setBegun({ revision: conflict.revision, form: conflict.theirs });
          setForm(conflict.theirs);
          setConflict(null);
          router.refresh();
        }}
        onKeepMine={() => {
          if (conflict !== null) keep(mineOverTheirs(begun.form, form, conflict.theirs), conflict.revision);
        }}
      />
    </Sheet>
  );
}

function ConflictDialog({
  conflict,
  boxes,
  working,
  onTakeTheirs,
  onKeepMine,
}: {
  conflict: Conflict | null;
  boxes: ReturnType<typeof contestedBoxes>;
  working: boolean;
  onTakeTheirs: () => void;
  onKeepMine: () => void;
}) {
  return (
    <Dialog
      open={conflict !== null}
      onOpenChange={(open) => !open && onTakeTheirs()}
      title="Somebody else changed the same boxes"
      lead="Nothing of yours was kept yet, and nothing is lost: both stay in the history."
      actions={
        <>
          <Button onClick={onTakeTheirs}>Keep theirs</Button>
          <Button kind="primary" disabled={working} onClick={onKeepMine}>
            Put mine over theirs
          </Button>
        </>
      }
    >
      <table className="data-table mt-3">
        <thead>
          <tr>
            <th scope="col">Box</th>
            <th scope="col">Theirs</th>
            <th scope="col">Yours</th>
          </tr>
        </thead>
        <tbody>
          {boxes.map((box) => (
            <tr key={box.path}>
              <th scope="row">{box.name}</th>
              <td>{box.theirs || "empty"}</td>
              <td>{box.mine || "empty"}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {boxes.length === 0 && (
        <Notice severity="note" title="The rows changed in other parts than their boxes show." />
      )}
    </Dialog>
  );
}
