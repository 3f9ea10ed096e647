export { placesNotFinite } from "./places-not-finite";
