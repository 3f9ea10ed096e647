const NUMBERS = [
  "No",
  "One",
  "Two",
  "Three",
  "Four",
  "Five",
  "Six",
  "Seven",
  "Eight",
  "Nine",
  "Ten",
  "Eleven",
  "Twelve",
];

/** "Nine" at the head of a sentence; digits past twelve. */
export function countInWords(count: number): string {
  return NUMBERS[count] ?? String(count);
}

/** "14 March 2026", in UTC so that server and reader agree. */
export function dayInWords(moment: string): string {
  return new Intl.DateTimeFormat("en-GB", {
    day: "numeric",
    month: "long",
    year: "numeric",
    timeZone: "UTC",
  }).format(new Date(moment));
}
