/** The stations that exist, in the order of the rail. A station's address is its folder under the study. */
export const STATIONS = ["set-up", "standards", "runs", "rates", "rate-law"] as const;

export type Station = (typeof STATIONS)[number];

export const STATION_NAMES: Readonly<Record<Station, string>> = {
  "set-up": "Set-up",
  standards: "Standards",
  runs: "Runs",
  rates: "Rates",
  "rate-law": "Rate law",
};

/** Where a member finds a station of a study. */
export function stationAddress(studyId: string): (station: Station) => string {
  return (station) => `/studies/${studyId}/${station}`;
}
