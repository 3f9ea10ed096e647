import { computeRoute } from "../compute-route";
import { initialRateComputation } from "../registry";

export const POST = computeRoute(initialRateComputation);
