export { type RandomDraws, randomDraws } from "./random-draws";
