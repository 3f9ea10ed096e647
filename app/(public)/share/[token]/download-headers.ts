/** Of a table that a reader takes away: never kept by a cache in between, since the link may be revoked. */
export function downloadHeaders(fileName: string): Record<string, string> {
  return {
    "Content-Type": "text/csv; charset=utf-8",
    "Content-Disposition": `attachment; filename="${fileName}"`,
    "Cache-Control": "private, no-store",
  };
}
