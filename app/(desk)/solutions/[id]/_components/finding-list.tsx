import { Finding } from '@/app/_components/ui/finding';
import { formatDateInWords } from '@/app/_components/ui/format-time';
import type { SolutionFinding } from '@/lib/contracts/api/solution';

const order = ['stop', 'caution', 'note'] as const;

interface FindingListProps {
  readonly findings: readonly SolutionFinding[];
  /** Several nights were solved together: each finding says which is its own. */
  readonly isJoint?: boolean;
}

/** What the solve found worth saying, the gravest first: why, and what helps. */
export function FindingList({ findings, isJoint = false }: FindingListProps) {
  const listed = findings.toSorted((one, other) => order.indexOf(one.weight) - order.indexOf(other.weight));
  return (
    <ul className="grid gap-2.5" aria-label="Findings">
      {listed.map((finding, index) => (
        <li key={index}>
          <OneFinding finding={finding} night={isJoint ? finding.night_date : null} />
        </li>
      ))}
    </ul>
  );
}

interface OneFindingProps {
  readonly finding: SolutionFinding;
  readonly night: string | null;
}

/** Reasons are whole sentences and name band and coefficient themselves. */
function OneFinding({ finding, night }: OneFindingProps) {
  const text = (
    <>
      {night === null ? null : <b className="font-medium">{formatDateInWords(night)}: </b>}
      {finding.reason}
      {finding.remedy === '' ? null : <span className="mt-0.5 block text-ink-2">{finding.remedy}</span>}
    </>
  );
  if (finding.weight === 'note') {
    return <div className="border-l-3 border-rule-strong px-3 py-2 text-table">{text}</div>;
  }
  return (
    <Finding
      tone={finding.weight === 'stop' ? 'bad' : 'warn'}
      {...(finding.weight === 'stop' ? { word: 'Stop' } : {})}
    >
      {text}
    </Finding>
  );
}
