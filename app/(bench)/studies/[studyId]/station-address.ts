import type { Station } from "@/app/_worksheet/station";

/** Where a member finds a station of a study. */
export function stationAddress(studyId: string): (station: Station) => string {
  return (station) => `/studies/${studyId}/${station}`;
}
