import { computeRoute } from "../compute-route";
import { saturationComputation } from "../registry";

export const POST = computeRoute(saturationComputation);
