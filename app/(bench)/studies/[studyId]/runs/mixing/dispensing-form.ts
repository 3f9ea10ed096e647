import { parseNumber } from "@/app/_worksheet/typed-number/parse-number";
import { typedNumber } from "@/app/_worksheet/typed-number/print-typed";
import type { Mixing } from "@/db/sheet/sheet.schema";
import { microlitres, volumeText } from "../_mixing/mixing-row";
import type { DispensingForm } from "./schema";

/** How volumes are dispensed, as boxes of text and back: small deliveries by a fixed error, larger ones in proportion. */
export type DispensingReading =
  | { readonly status: "read"; readonly mixing: Mixing }
  | { readonly status: "faults"; readonly faults: Readonly<Record<string, string>> };

export function dispensingFormOf({ volumeUnit, markMicrolitre, deliveries }: Mixing): DispensingForm {
  const small = deliveries.find(({ upToMicrolitre }) => upToMicrolitre !== null);
  const large = deliveries.find(({ upToMicrolitre }) => upToMicrolitre === null);
  return {
    unit: volumeUnit,
    mark: markMicrolitre === null ? "" : volumeText(markMicrolitre, volumeUnit),
    upTo: small?.upToMicrolitre == null ? "" : volumeText(small.upToMicrolitre, volumeUnit),
    absolute: small === undefined ? "" : volumeText(small.absoluteMicrolitre, volumeUnit),
    percent: large === undefined ? "" : typedNumber(large.relative * 100),
  };
}

/** The same volumes in the other unit; what is no number stays as it was typed. */
export function inVolumeUnit(form: DispensingForm, unit: DispensingForm["unit"]): DispensingForm {
  const turned = (text: string) => {
    const reading = parseNumber(text);
    return reading.status === "number" ? volumeText(microlitres(reading.value, form.unit), unit) : text;
  };
  return {
    ...form,
    unit,
    mark: turned(form.mark),
    upTo: turned(form.upTo),
    absolute: turned(form.absolute),
  };
}

export function readDispensingForm(form: DispensingForm): DispensingReading {
  const faults: Record<string, string> = {};
  const read = (path: "mark" | "upTo" | "absolute" | "percent"): number | null => {
    const reading = parseNumber(form[path]);
    if (reading.status === "empty") return null;
    if (reading.status === "not-a-number") faults[path] = reading.message;
    else if (reading.value < 0) faults[path] = "This is not negative.";
    else return reading.value;
    return null;
  };
  const [mark, upTo, absolute, percent] = [read("mark"), read("upTo"), read("absolute"), read("percent")];
  if (mark === 0) faults.mark = "A mark is above 0. Left empty, a mixture is the sum of its volumes.";
  if (upTo === 0) faults.upTo = "Small deliveries reach up to a volume above 0. Left empty, there are none.";
  if (upTo === null && absolute !== null && faults.upTo === undefined)
    faults.upTo = "Say up to which volume that uncertainty counts.";
  if (percent !== null && percent > 100) faults.percent = "At most 100 %.";
  if (Object.keys(faults).length > 0) return { status: "faults", faults };
  const { unit } = form;
  return {
    status: "read",
    mixing: {
      volumeUnit: unit,
      markMicrolitre: mark === null ? null : microlitres(mark, unit),
      deliveries: [
        ...(upTo === null
          ? []
          : [
              {
                upToMicrolitre: microlitres(upTo, unit),
                absoluteMicrolitre: microlitres(absolute ?? 0, unit),
                relative: 0,
              },
            ]),
        ...(percent === null && upTo === null
          ? []
          : [
              {
                upToMicrolitre: null,
                absoluteMicrolitre: 0,
                relative: Number(((percent ?? 0) / 100).toPrecision(12)),
              },
            ]),
      ],
    },
  };
}
