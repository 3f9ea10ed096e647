export { ionicStrengthOf } from "./ionic-strength";
