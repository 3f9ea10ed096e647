import { Disclosure } from "@/app/_ui/disclosure";
import { MarginSection } from "@/app/_ui/margin";
import { typeset } from "@/app/_ui/prose";
import { RunMark } from "@/app/_ui/run-mark";
import { Unit } from "@/app/_ui/unit";
import type { InfluenceView } from "./rate-law.view";

/** Runs that are listed before the rest folds away. */
const SHOWN = 6;

/** k when one run is left out, the most influential first. */
export function InfluenceTable({ influence }: { influence: InfluenceView }) {
  const rest = influence.rows.slice(SHOWN);
  return (
    <MarginSection title="If a run were set aside">
      <Rows rows={influence.rows.slice(0, SHOWN)} />
      {rest.length > 0 && (
        <Disclosure
          summary={
            rest.length === 1
              ? "One run more, of less influence"
              : `${rest.length} runs more, of less influence`
          }
        >
          <Rows rows={rest} />
        </Disclosure>
      )}
      <p className="mt-1.5 text-label text-ink-3">
        {typeset(influence.quantity)} without it, <Unit text={influence.unit} />, by the same windows and
        weights
      </p>
    </MarginSection>
  );
}

function Rows({ rows }: { rows: InfluenceView["rows"] }) {
  return (
    <table className="w-full text-caption">
      <tbody>
        {rows.map(({ run, value, shift }) => (
          <tr key={run.label}>
            <th scope="row" className="py-0.5 text-left">
              <RunMark mark={run.mark} label={run.label} state={run.setAside ? "set-aside" : "standing"} />
            </th>
            <td className="text-right">{value}</td>
            <td className="pl-3 text-right text-ink-2">{shift}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
