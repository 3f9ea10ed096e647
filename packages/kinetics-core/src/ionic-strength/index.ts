export { type ActivityForm, activityCoefficient, activityFunction } from "./activity-coefficient";
export { type DebyeHueckelConstants, debyeHueckelA, debyeHueckelFromConstants } from "./debye-hueckel";
export { ionicStrengthOf } from "./ionic-strength";
export {
  correctedForSalt,
  LARGEST_IONIC_STRENGTH,
  type SaltEffect,
  type SaltEffectForm,
  type SaltEffectInput,
  saltEffect,
} from "./salt-effect";
export { WATER_RANGE, waterDensity, waterPermittivity } from "./water";
