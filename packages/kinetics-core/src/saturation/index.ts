export { fitSaturation } from "./fit-saturation";
export type { LackOfFit, SaturationFit, SaturationInput, SaturationResult } from "./saturation";
