import type { Change } from "@/app/_import/change";
import type { Issue } from "@/app/_import/reading";
import { Button } from "@/app/_ui/button";
import { SeverityMark } from "@/app/_ui/check";
import { SectionTitle } from "@/app/_ui/sheet";
import { showLine } from "./file-table";

/** What the reader found, worst first, each with its place, the text found and what repairs it. */
export function IssueList({ issues, change }: { issues: readonly Issue[]; change: (made: Change) => void }) {
  if (issues.length === 0) return null;
  const open = issues.filter((issue) => issue.severity === "blocks").length;
  const settled = issues.filter((issue) => issue.severity === "settled").length;
  return (
    <section className="mt-6">
      <SectionTitle note={`${open === 0 ? "none" : open} for you, ${settled} settled by the reader`}>
        Issues
      </SectionTitle>
      <ul className="import-issues">
        {issues.map((issue, i) => (
          <li key={`${issue.code}-${issue.place}-${i}`}>
            {issue.severity === "settled" ? (
              <SeverityMark severity="holds" settled>
                Settled
              </SeverityMark>
            ) : (
              <SeverityMark severity={issue.severity} />
            )}
            {issue.line === null ? (
              <span className="place">{issue.place}</span>
            ) : (
              <button type="button" className="text-button place" onClick={() => showLine(issue)}>
                {issue.place}
              </button>
            )}
            <span>{issue.message}</span>
            <span className="repairs">
              {issue.repairs.map((repair, j) => (
                <Button
                  key={repair.label}
                  size="small"
                  kind={j === 0 && issue.severity === "blocks" ? "primary" : "plain"}
                  onClick={() => change(repair.change)}
                >
                  {repair.label}
                </Button>
              ))}
            </span>
          </li>
        ))}
      </ul>
    </section>
  );
}
