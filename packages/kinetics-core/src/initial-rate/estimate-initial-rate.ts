import { studentTQuantile } from "kinetics-core/distributions";
import type { Flag } from "kinetics-core/quantities";
