import type { RunConcentrationTable, RunTable, RunVolumeTable } from "../run/run.table";
import type { SpeciesTable } from "../species/species.table";
import type { StudyTable } from "../study/study.table";
import type { UploadTable } from "../upload/upload.table";
import type { Sheet, SheetRun, SheetSpecies, SheetUpload } from "./sheet.schema";

/** The sheet's rows as columns, and back. Nothing is rounded or converted on the way. */

type StudySheetColumns = Omit<
  StudyTable,
  "id" | "group_id" | "number" | "revision" | "created_at" | "updated_at"
>;

export function studyColumns(sheet: Sheet): StudySheetColumns {
  const { study, conditions, signal, mixing, calibration } = sheet;
  const calibrated = signal?.kind === "calibrated" ? signal : null;
  return {
    name: study.name,
    invented: study.invented ? 1 : 0,
    reaction: study.reaction,
    time_unit: study.timeUnit,
    hazards: study.hazards,
    followed_species_id: sheet.followedSpeciesId,
    temperature_kelvin: conditions.temperatureKelvin?.value ?? null,
    temperature_kelvin_uncertainty: conditions.temperatureKelvin?.standardUncertainty ?? null,
    ionic_strength_molar: conditions.ionicStrengthMolar?.value ?? null,
    ionic_strength_molar_uncertainty: conditions.ionicStrengthMolar?.standardUncertainty ?? null,
    path_length_centimetre: conditions.pathLengthCentimetre?.value ?? null,
    path_length_centimetre_uncertainty: conditions.pathLengthCentimetre?.standardUncertainty ?? null,
    wavelength_nanometre: conditions.wavelengthNanometre,
    solvent: conditions.solvent,
    electrolyte: conditions.electrolyte,
    activation_energy: conditions.activationEnergy?.value ?? null,
    activation_energy_uncertainty: conditions.activationEnergy?.standardUncertainty ?? null,
    reference_ionic_strength_molar: conditions.referenceIonicStrengthMolar,
    sample_interval_seconds: conditions.sampleIntervalSeconds,
    signal_kind: signal?.kind ?? null,
    signal_quantity: calibrated?.quantity ?? null,
    signal_unit: signal?.unit ?? null,
    signal_per_molar: calibrated?.perMolar.value ?? null,
    signal_per_molar_uncertainty: calibrated?.perMolar.standardUncertainty ?? null,
    signal_blank: calibrated?.blank?.value ?? null,
    signal_blank_uncertainty: calibrated?.blank?.standardUncertainty ?? null,
    signal_source: calibrated?.source ?? null,
    mixing_volume_unit: mixing.volumeUnit,
    mixing_mark_microlitre: mixing.markMicrolitre,
    mixing_deliveries: JSON.stringify(mixing.deliveries),
    calibration_species_id: calibration.speciesId,
    calibration_intercept: calibration.intercept,
    calibration_weighting: calibration.weighting,
    calibration_range_low_molar: calibration.rangeMolar?.low ?? null,
    calibration_range_high_molar: calibration.rangeMolar?.high ?? null,
    calibration_stock_relative: calibration.stockRelative,
  };
}

/** The parts of a sheet that stand in the study's own row, unparsed: `readSheet` parses the whole. */
export function studyFromColumns(row: StudySheetColumns) {
  const deliveries: unknown = JSON.parse(row.mixing_deliveries);
  return {
    study: {
      name: row.name,
      invented: row.invented === 1,
      reaction: row.reaction,
      timeUnit: row.time_unit,
      hazards: row.hazards,
    },
    followedSpeciesId: row.followed_species_id,
    conditions: {
      temperatureKelvin: uncertain(row.temperature_kelvin, row.temperature_kelvin_uncertainty),
      ionicStrengthMolar: uncertain(row.ionic_strength_molar, row.ionic_strength_molar_uncertainty),
      pathLengthCentimetre: uncertain(row.path_length_centimetre, row.path_length_centimetre_uncertainty),
      wavelengthNanometre: row.wavelength_nanometre,
      solvent: row.solvent,
      electrolyte: row.electrolyte,
      activationEnergy: uncertain(row.activation_energy, row.activation_energy_uncertainty),
      referenceIonicStrengthMolar: row.reference_ionic_strength_molar,
      sampleIntervalSeconds: row.sample_interval_seconds,
    },
    mixing: {
      volumeUnit: row.mixing_volume_unit,
      markMicrolitre: row.mixing_mark_microlitre,
      deliveries,
    },
    calibration: {
      speciesId: row.calibration_species_id,
      intercept: row.calibration_intercept,
      weighting: row.calibration_weighting,
      rangeMolar:
        row.calibration_range_low_molar === null
          ? null
          : { low: row.calibration_range_low_molar, high: row.calibration_range_high_molar },
      stockRelative: row.calibration_stock_relative,
    },
    signal:
      row.signal_kind === null
        ? null
        : row.signal_kind === "concentration"
          ? { kind: row.signal_kind, unit: row.signal_unit }
          : {
              kind: row.signal_kind,
              quantity: row.signal_quantity,
              unit: row.signal_unit,
              perMolar: uncertain(row.signal_per_molar, row.signal_per_molar_uncertainty),
              blank: uncertain(row.signal_blank, row.signal_blank_uncertainty),
              source: row.signal_source,
            },
  };
}

/** A quantity and its uncertainty are two columns, null together. */
function uncertain(value: number | null, standardUncertainty: number | null) {
  return value === null ? null : { value, standardUncertainty };
}

export function speciesColumns(studyId: string, species: SheetSpecies, revision: number): SpeciesTable {
  return {
    study_id: studyId,
    id: species.id,
    symbol: species.symbol,
    name: species.name,
    formula: species.formula,
    stoichiometric_number: species.stoichiometricNumber,
    charge: species.charge,
    role: species.role,
    in_law: species.inLaw ? 1 : 0,
    unit: species.unit,
    position: species.position,
    changed_in: revision,
    removed_in: null,
  };
}

export function speciesFromColumns(row: SpeciesTable) {
  return {
    id: row.id,
    symbol: row.symbol,
    name: row.name,
    formula: row.formula,
    stoichiometricNumber: row.stoichiometric_number,
    charge: row.charge,
    role: row.role,
    inLaw: row.in_law === 1,
    unit: row.unit,
    position: row.position,
  };
}

export function runColumns(studyId: string, run: SheetRun): RunTable {
  return {
    study_id: studyId,
    id: run.id,
    label: run.label,
    position: run.position,
    temperature_kelvin: run.temperatureKelvin,
    block: run.block,
    mixture: run.mixture,
    trace_sha256: run.trace?.sha256 ?? null,
    trace_points: run.trace?.points ?? null,
    trace_upload_id: run.trace?.uploadId ?? null,
    trace_column: run.trace?.column ?? null,
    entered_rate_molar_per_second: run.enteredRate?.molarPerSecond ?? null,
    entered_rate_standard_error: run.enteredRate?.standardError ?? null,
    time_zero_seconds: run.timeZeroSeconds,
    mark_microlitre: run.markMicrolitre,
    dead_time_seconds: run.deadTimeSeconds,
    trim_from_seconds: run.trim?.fromSeconds ?? null,
    trim_to_seconds: run.trim?.toSeconds ?? null,
    spikes: JSON.stringify(run.spikes),
    end_signal: run.endSignal?.value ?? null,
    end_signal_uncertainty: run.endSignal?.standardUncertainty ?? null,
    window_from_seconds: run.window?.fromSeconds ?? null,
    window_to_seconds: run.window?.toSeconds ?? null,
    set_aside_reason: run.setAside?.reason ?? null,
    set_aside_member_id: run.setAside?.memberId ?? null,
    set_aside_at: run.setAside?.at ?? null,
    remark: run.remark,
    changed_in: run.changedIn,
    removed_in: run.removedIn,
  };
}

export function runFromColumns(
  row: RunTable,
  concentrations: readonly RunConcentrationTable[],
  volumes: readonly RunVolumeTable[],
) {
  const spikes: unknown = JSON.parse(row.spikes);
  return {
    id: row.id,
    label: row.label,
    position: row.position,
    concentrations: Object.fromEntries(
      concentrations.map((of) => [
        of.species_id,
        { molar: of.molar, relativeUncertainty: of.relative_uncertainty },
      ]),
    ),
    temperatureKelvin: row.temperature_kelvin,
    block: row.block,
    mixture: row.mixture,
    trace:
      row.trace_sha256 === null
        ? null
        : {
            sha256: row.trace_sha256,
            points: row.trace_points,
            uploadId: row.trace_upload_id,
            column: row.trace_column,
          },
    enteredRate:
      row.entered_rate_molar_per_second === null
        ? null
        : {
            molarPerSecond: row.entered_rate_molar_per_second,
            standardError: row.entered_rate_standard_error,
          },
    volumes: Object.fromEntries(volumes.map((of) => [of.stock_id, of.microlitre])),
    markMicrolitre: row.mark_microlitre,
    timeZeroSeconds: row.time_zero_seconds,
    deadTimeSeconds: row.dead_time_seconds,
    trim:
      row.trim_from_seconds === null
        ? null
        : { fromSeconds: row.trim_from_seconds, toSeconds: row.trim_to_seconds },
    spikes,
    endSignal: uncertain(row.end_signal, row.end_signal_uncertainty),
    window:
      row.window_from_seconds === null
        ? null
        : { fromSeconds: row.window_from_seconds, toSeconds: row.window_to_seconds },
    setAside:
      row.set_aside_reason === null
        ? null
        : { reason: row.set_aside_reason, memberId: row.set_aside_member_id, at: row.set_aside_at },
    remark: row.remark,
    changedIn: row.changed_in,
    removedIn: row.removed_in,
  };
}

export function uploadColumns(studyId: string, upload: SheetUpload, revision: number): UploadTable {
  return {
    study_id: studyId,
    id: upload.id,
    sha256: upload.sha256,
    file_name: upload.fileName,
    size: upload.size,
    at: upload.at,
    member_id: upload.memberId,
    reading: upload.reading,
    changed_in: revision,
    removed_in: null,
  };
}

export function uploadFromColumns(row: UploadTable) {
  return {
    id: row.id,
    sha256: row.sha256,
    fileName: row.file_name,
    size: row.size,
    at: row.at,
    memberId: row.member_id,
    reading: row.reading,
  };
}
