/** I = ½ Σ c z², in the unit of the concentrations: charge numbers by the side of them, 0 for neutral species. */
export function ionicStrengthOf(concentrations: ArrayLike<number>, charges: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < concentrations.length; i++) sum += (concentrations[i] ?? 0) * (charges[i] ?? 0) ** 2;
  return sum / 2;
}
