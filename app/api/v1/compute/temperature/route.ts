import { computeRoute } from "../compute-route";
import { temperatureComputation } from "../registry";

export const POST = computeRoute(temperatureComputation);
