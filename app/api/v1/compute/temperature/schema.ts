import { ZERO_CELSIUS } from "kinetics-core/quantities";
import { z } from "zod";
import { estimate, flag, level, measured } from "../estimate.schema";

/** Below this nothing in a vessel reacts, and squares of 1/T leave the range of a double. */
const COLDEST_KELVIN = 1e-3;
const HOTTEST_KELVIN = 1e5;

const temperature = z.number().min(-ZERO_CELSIUS).max(HOTTEST_KELVIN);

export const temperatureRequest = z
  .object({
    points: z
      .array(
        z.object({
          temperature: temperature.meta({ description: "In `temperatureUnit`." }),
          k: measured.gt(0).meta({ description: "Rate constant; one unit and one law for all points." }),
          kStandardError: measured.nonnegative().optional().meta({
            description: "Without what `shared` states. Weights need it at every point.",
          }),
          temperatureStandardError: z.number().min(0).max(100).optional().meta({
            description: "How well this bath was held, in K.",
          }),
          orders: z.record(z.string().min(1).max(80), z.number().min(-6).max(6)).optional().meta({
            description: "Orders of the law that k belongs to; points of different orders are flagged.",
          }),
        }),
      )
      .min(1)
      .max(500),
    temperatureUnit: z.enum(["K", "degC"]).default("K"),
    shared: z
      .array(
        z.object({
          source: z.string().min(1).max(80),
          relative: z.number().min(0).max(1).optional().meta({ description: "Of every k alike." }),
          temperature: z.number().min(0).max(100).optional().meta({
            description: "Of every temperature alike, in K: the thermometer.",
          }),
        }),
      )
      .max(50)
      .optional(),
    overallOrder: z.number().min(-12).max(12).optional().meta({
      description: "Needed for the entropy of activation where concentrations are not in mol/L.",
    }),
    concentrationUnit: z.enum(["mol/L", "mmol/L", "umol/L", "mmHg"]).default("mol/L"),
    timeUnit: z.enum(["s", "min", "h"]).default("s"),
    weighting: z.enum(["scatter", "stated"]).optional().meta({
      description:
        "`scatter` (default): 1/(u² + f), f the scatter between points or the mean of u², whichever is greater. `stated`: 1/u² alone with errors from residuals, as textbooks do; it undercovers where the stated u are uneven.",
    }),
    at: z.array(temperature).max(500).optional().meta({
      description: "Temperatures at which k is wanted, in `temperatureUnit`.",
    }),
    level: level.optional(),
  })
  .refine(
    ({ concentrationUnit, overallOrder }) => concentrationUnit === "mol/L" || overallOrder !== undefined,
    {
      path: ["overallOrder"],
      error:
        "is needed where concentrations are not in mol/L, since the entropy of activation refers to 1 mol/L",
    },
  )
  .superRefine(({ points, at = [], temperatureUnit }, context) => {
    const zero = temperatureUnit === "degC" ? ZERO_CELSIUS : 0;
    const check = (value: number, path: (string | number)[]) => {
      if (value + zero >= COLDEST_KELVIN) return;
      context.addIssue({
        code: "custom",
        path,
        message: `is ${value} ${temperatureUnit === "degC" ? "°C" : "K"}, not above absolute zero; check temperatureUnit`,
      });
    };
    points.forEach((point, index) => {
      check(point.temperature, ["points", index, "temperature"]);
    });
    at.forEach((value, index) => {
      check(value, ["at", index]);
    });
  })
  .meta({ id: "TemperatureRequest" });

const twoByTwo = z.tuple([z.tuple([z.number(), z.number()]), z.tuple([z.number(), z.number()])]).nullable();

export const temperatureResponse = z
  .object({
    activationEnergy: estimate.meta({ description: "E_a in J/mol." }),
    logPreExponential: estimate.meta({ description: "Natural logarithm of A, in the unit of k." }),
    preExponential: estimate,
    enthalpyOfActivation: estimate.meta({ description: "ΔH‡ in J/mol." }),
    entropyOfActivation: estimate.meta({
      description: "ΔS‡ in J/(mol K), transmission coefficient 1, standard state 1 mol/L.",
    }),
    covariance: z.object({
      arrhenius: twoByTwo.meta({ description: "Of E_a and ln A." }),
      eyring: twoByTwo.meta({ description: "Of ΔH‡ and ΔS‡." }),
    }),
    degreesOfFreedom: z.number(),
    betweenPointStandardDeviation: z.number().nullable().meta({
      description: "Scatter of ln k between points beyond the stated errors.",
    }),
    temperatures: z.number().meta({ description: "Number of different temperatures." }),
    range: z.tuple([z.number(), z.number()]).meta({ description: "In `temperatureUnit`." }),
    curvature: z
      .object({
        activationEnergySlope: estimate.meta({ description: "dE_a/dT in J/(mol K)." }),
        heatCapacityOfActivation: estimate.meta({ description: "ΔC_p‡ in J/(mol K)." }),
        fStatistic: z.number(),
        pValue: z.number(),
        degreesOfFreedom: z.number(),
      })
      .nullable()
      .meta({ description: "Null with fewer than five temperatures." }),
    rateConstants: z.array(
      z.object({
        temperature: z.number(),
        rateConstant: estimate,
        newDetermination: estimate.meta({
          description: "Where another determination of k at this temperature would fall.",
        }),
        gibbsEnergyOfActivation: estimate.meta({ description: "ΔG‡ in J/mol." }),
      }),
    ),
    residuals: z.array(z.object({ residual: z.number(), weight: z.number() })).meta({
      description: "Of ln k about the Arrhenius line, and relative weight, in the order of the points.",
    }),
    flags: z.array(flag),
  })
  .meta({ id: "TemperatureResponse" });

export type TemperatureRequest = z.infer<typeof temperatureRequest>;
export type TemperatureResponse = z.infer<typeof temperatureResponse>;
