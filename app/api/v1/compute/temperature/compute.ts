import { ZERO_CELSIUS } from "kinetics-core/quantities";
import {
  fitTemperature,
  gibbsEnergyOfActivationAt,
  rateConstantAt,
  type TemperatureFit,
  type TemperatureInput,
  type TwoByTwo,
} from "kinetics-core/temperature";
import type { Computed } from "../estimate.schema";
import { plainEstimate as plain } from "../plain-estimate";
import type { TemperatureRequest, TemperatureResponse } from "./schema";

/** The public face of `fitTemperature`: temperatures into kelvins and back, k as it came. */
export function computeTemperature(request: TemperatureRequest): Computed<TemperatureResponse> {
  const fit = fitTemperature(inputOf(request));
  if (fit.status !== "fitted")
    return { ok: false, errors: [{ path: placeInRequest(fit.place), message: fit.message }] };
  return { ok: true, answer: answerOf(fit, request) };
}

function inputOf(request: TemperatureRequest): TemperatureInput {
  const { points, shared, overallOrder, concentrationUnit, timeUnit, weighting, level } = request;
  const zero = zeroOf(request);
  return {
    points: points.map((point) => ({
      temperatureKelvin: point.temperature + zero,
      rateConstant: point.k,
      ...(point.kStandardError === undefined ? {} : { rateConstantUncertainty: point.kStandardError }),
      ...(point.temperatureStandardError === undefined
        ? {}
        : { temperatureUncertaintyKelvin: point.temperatureStandardError }),
      ...(point.orders === undefined ? {} : { orders: point.orders }),
    })),
    ...(shared === undefined
      ? {}
      : {
          shared: shared.map(({ source, relative = 0, temperature = 0 }) => ({
            source,
            relative,
            temperatureKelvin: temperature,
          })),
        }),
    // In mol/L the order is not needed: its factor is 1.
    unit: { overallOrder: overallOrder ?? 1, concentrationUnit, timeUnit },
    ...(weighting === undefined ? {} : { weighting }),
    ...(level === undefined ? {} : { level }),
  };
}

function zeroOf({ temperatureUnit }: TemperatureRequest): number {
  return temperatureUnit === "degC" ? ZERO_CELSIUS : 0;
}

const FIELDS: Readonly<Record<string, string>> = {
  temperatureKelvin: "temperature",
  rateConstant: "k",
  rateConstantUncertainty: "kStandardError",
  temperatureUncertaintyKelvin: "temperatureStandardError",
};

function placeInRequest(place: string): string {
  return place
    .split(".")
    .map((part) => FIELDS[part] ?? part)
    .join(".");
}

function answerOf(fit: TemperatureFit, request: TemperatureRequest): TemperatureResponse {
  const zero = zeroOf(request);
  const wanted = (request.at ?? []).map((temperature) => ({
    temperature,
    at: rateConstantAt(fit, temperature + zero),
  }));
  const { curvature } = fit;
  return {
    activationEnergy: plain(fit.activationEnergy),
    logPreExponential: plain(fit.logPreExponential),
    preExponential: plain(fit.preExponential),
    enthalpyOfActivation: plain(fit.enthalpyOfActivation),
    entropyOfActivation: plain(fit.entropyOfActivation),
    covariance: { arrhenius: plainPair(fit.covariance.arrhenius), eyring: plainPair(fit.covariance.eyring) },
    degreesOfFreedom: fit.degreesOfFreedom,
    betweenPointStandardDeviation: fit.betweenPointStandardDeviation,
    temperatures: fit.temperatures,
    range: [fit.range[0] - zero, fit.range[1] - zero],
    curvature:
      curvature === null
        ? null
        : {
            ...curvature,
            activationEnergySlope: plain(curvature.activationEnergySlope),
            heatCapacityOfActivation: plain(curvature.heatCapacityOfActivation),
          },
    rateConstants: wanted.map(({ temperature, at }) => ({
      temperature,
      rateConstant: plain(at.rateConstant),
      newDetermination: plain(at.newDetermination),
      gibbsEnergyOfActivation: plain(gibbsEnergyOfActivationAt(fit, at.temperatureKelvin)),
    })),
    residuals: fit.residuals.map((one) => ({ ...one })),
    flags: [...fit.flags, ...wanted.flatMap(({ at }) => at.flags)].map((flag) => ({ ...flag })),
  };
}

function plainPair(pair: TwoByTwo | null): TemperatureResponse["covariance"]["arrhenius"] {
  return pair === null ? null : [[...pair[0]], [...pair[1]]];
}
