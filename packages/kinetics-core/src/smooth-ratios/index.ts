export { decayRatio, decayRatioSlope, logRatio, logRatioSlope } from "./smooth-ratios";
