export type { Estimate, Flag, Severity, Uncertain } from "./estimate";
