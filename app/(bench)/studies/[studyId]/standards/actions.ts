"use server";

import { refused } from "@/app/_server/action-result";
import { memberAction } from "@/app/_server/member-action";
import { changeWithEffect } from "@/app/_server/study-change";
import { readStandardLines } from "@/app/_worksheet/standards/standard-lines";
import { workedOut } from "@/app/_worksheet/worked-out";
import { newIdentifier } from "@/db/identifier";
import { changeStudy } from "@/db/study/change-study";
import { readSettings } from "./read-settings";
import { followInput, settingsInput, standardAsideInput, standardLinesInput } from "./schema";
import { withAside, withFollowing, withLines, withSettings } from "./sheet-changes";

/** Keeps the standards as the lines say; those that are no longer among the lines leave the sheet. */
export const keepStandards = memberAction(standardLinesInput, "analyst", async ({ db, actor, input }) => {
  const { lines, unit } = input;
  const typed = readStandardLines(lines, unit, [], newIdentifier);
  if (typed.status === "faults")
    return refused(
      "Nothing was kept: not every line can be read.",
      typed.faults.map(({ line, message }) => ({
        path: `lines.${line}`,
        message: `Line ${line}: ${message}`,
      })),
    );
  return changeWithEffect(db, actor, input.studyId, () =>
    changeStudy(
      db,
      actor,
      input,
      {
        verb: "standards changed",
        summary: (_, { standards }) =>
          standards.length === 0
            ? "No standards on the sheet."
            : `${standards.length === 1 ? "One standard" : `${standards.length} standards`} on the sheet.`,
      },
      (sheet) => withLines(sheet, lines, unit, newIdentifier),
      workedOut,
    ),
  );
});

/** Keeps what the standards contain and how the line is drawn. */
export const keepSettings = memberAction(settingsInput, "analyst", async ({ db, actor, input }) => {
  const read = readSettings(input);
  if (read.status === "faults") return refused("Nothing was kept: not every box can be read.", read.faults);
  return changeWithEffect(db, actor, input.studyId, () =>
    changeStudy(
      db,
      actor,
      input,
      { verb: "calibration changed", summary: "Changed how the line of the standards is drawn." },
      (sheet) => withSettings(sheet, input.speciesId, read.settings),
      workedOut,
    ),
  );
});

/** Lets the study's signal follow the line, or parts them. */
export const followLine = memberAction(followInput, "analyst", ({ db, actor, input }) =>
  changeWithEffect(db, actor, input.studyId, () =>
    changeStudy(
      db,
      actor,
      input,
      {
        verb: "signal changed",
        summary: input.follow
          ? "The signal follows the standards."
          : "The signal no longer follows the standards.",
      },
      (sheet) => withFollowing(sheet, input.follow),
      workedOut,
    ),
  ),
);

export const setStandardAside = memberAction(standardAsideInput, "analyst", ({ db, actor, input }) => {
  const { standardId, reason } = input;
  const setAside =
    reason === null ? null : { reason, memberId: actor.memberId, at: new Date().toISOString() };
  return changeWithEffect(db, actor, input.studyId, () =>
    changeStudy(
      db,
      actor,
      input,
      {
        verb: reason === null ? "standard taken back" : "standard set aside",
        summary: (before) => {
          const label = before.standards.find(({ id }) => id === standardId)?.label ?? "A standard";
          return reason === null ? `${label} taken back.` : `${label} set aside: ${reason}`;
        },
      },
      (sheet) => withAside(sheet, standardId, setAside),
      workedOut,
    ),
  );
});
