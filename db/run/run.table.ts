import { z } from "zod";

/** A run of the sheet. Columns that belong together (trace, window, set aside) are null together. */
export const runRow = z.object({
  study_id: z.string(),
  id: z.string(),
  label: z.string(),
  position: z.number(),
  temperature_kelvin: z.number().nullable(),
  block: z.string().nullable(),
  mixture: z.string().nullable(),
  trace_sha256: z.string().nullable(),
  trace_points: z.number().nullable(),
  trace_upload_id: z.string().nullable(),
  trace_column: z.string().nullable(),
  entered_rate_molar_per_second: z.number().nullable(),
  entered_rate_standard_error: z.number().nullable(),
  time_zero_seconds: z.number(),
  mark_microlitre: z.number().nullable(),
  dead_time_seconds: z.number(),
  trim_from_seconds: z.number().nullable(),
  trim_to_seconds: z.number().nullable(),
  /** JSON array of places in the trace. */
  spikes: z.string(),
  end_signal: z.number().nullable(),
  end_signal_uncertainty: z.number().nullable(),
  window_from_seconds: z.number().nullable(),
  window_to_seconds: z.number().nullable(),
  set_aside_reason: z.string().nullable(),
  set_aside_member_id: z.string().nullable(),
  set_aside_at: z.string().nullable(),
  remark: z.string(),
  changed_in: z.number(),
  removed_in: z.number().nullable(),
});

export type RunTable = z.infer<typeof runRow>;

export const runConcentrationRow = z.object({
  study_id: z.string(),
  run_id: z.string(),
  species_id: z.string(),
  molar: z.number(),
  relative_uncertainty: z.number(),
});

export type RunConcentrationTable = z.infer<typeof runConcentrationRow>;

export const runVolumeRow = z.object({
  study_id: z.string(),
  run_id: z.string(),
  stock_id: z.string(),
  microlitre: z.number(),
});

export type RunVolumeTable = z.infer<typeof runVolumeRow>;
