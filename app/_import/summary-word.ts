/** What spreadsheets and instruments write before the statistics of a column, in the languages of their makers. */
const SUMMARY =
  /^(mean|average|avg|median|std\.?( ?dev\.?)?|stdev|st\.? ?dev\.?|standard deviation|sd|%? ?rsd|variance|sum|total|count|min(imum)?|max(imum)?|range|slope|intercept|mittel(wert)?|stabw\.?|standardabweichung|summe|anzahl|steigung|moyenne|[ée]cart[- ]type|media|desviaci[óo]n est[áa]ndar)(\W|$)/i;

export function isSummaryWord(cell: string): boolean {
  return SUMMARY.test(cell);
}
