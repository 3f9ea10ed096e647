import { computeRoute } from "../compute-route";
import { calibrationComputation } from "../registry";

export const POST = computeRoute(calibrationComputation);
