/** Room for the ticks of a calibration line and of its residuals, the same so that their concentrations lie above each other. */
export const LINE_LEFT = 52;
