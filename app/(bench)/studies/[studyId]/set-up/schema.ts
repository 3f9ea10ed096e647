import { z } from "zod";
import { base, studyId } from "../../_change/schema";
import { setUpForm } from "../../_set-up/set-up-form.schema";

export const setUpInput = z.object({ studyId, base, form: setUpForm });
