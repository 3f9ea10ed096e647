import type { SheetStandard } from "../sheet/sheet.schema";
import type { StandardTable } from "./standard.table";

export function standardColumns(studyId: string, standard: SheetStandard, revision: number): StandardTable {
  return {
    study_id: studyId,
    id: standard.id,
    label: standard.label,
    position: standard.position,
    molar: standard.concentration.value,
    molar_uncertainty: standard.concentration.standardUncertainty,
    signals: JSON.stringify(standard.signals),
    is_blank: standard.isBlank ? 1 : 0,
    set_aside_reason: standard.setAside?.reason ?? null,
    set_aside_member_id: standard.setAside?.memberId ?? null,
    set_aside_at: standard.setAside?.at ?? null,
    remark: standard.remark,
    changed_in: revision,
    removed_in: null,
  };
}

/** Unparsed: `readSheet` parses the whole. */
export function standardFromColumns(row: StandardTable) {
  const signals: unknown = JSON.parse(row.signals);
  return {
    id: row.id,
    label: row.label,
    position: row.position,
    concentration: { value: row.molar, standardUncertainty: row.molar_uncertainty },
    signals,
    isBlank: row.is_blank === 1,
    setAside:
      row.set_aside_reason === null
        ? null
        : { reason: row.set_aside_reason, memberId: row.set_aside_member_id, at: row.set_aside_at },
    remark: row.remark,
  };
}
