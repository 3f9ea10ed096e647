export { estimateOfRatio, fieller, type Ratio, type RatioOfEstimates, type RatioSet } from "./fieller";
