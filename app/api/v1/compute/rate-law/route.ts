import { computeRoute } from "../compute-route";
import { rateLawComputation } from "../registry";

export const POST = computeRoute(rateLawComputation);
