import { Finding } from '@/app/_components/ui/finding';
import { formatDateInWords } from '@/app/_components/ui/format-time';
import type { SolutionFinding } from '@/lib/contracts/api/solution';
import { coefficientWords } from '@/lib/contracts/coefficients';

const order = ['stop', 'caution', 'note'] as const;

/** What the solve found worth saying, the gravest first: why, and what helps. */
export function FindingList({ findings }: { readonly findings: readonly SolutionFinding[] }) {
  const listed = findings.toSorted((one, other) => order.indexOf(one.weight) - order.indexOf(other.weight));
  return (
    <ul className="grid gap-2.5" aria-label="Findings">
      {listed.map((finding, index) => (
        <li key={index}>
          <OneFinding finding={finding} />
        </li>
      ))}
    </ul>
  );
}

/** What a finding is about: `Extinction in B`; empty for the whole night. */
function subjectWords({ coefficient, band, night_date }: SolutionFinding): string {
  const what = coefficient === null ? '' : coefficientWords[coefficient].title;
  const where = band === null ? '' : what === '' ? `Band ${band}` : ` in ${band}`;
  const when = night_date === null ? '' : ` on ${formatDateInWords(night_date)}`;
  const words = `${what}${where}${when}`.trim();
  return words.charAt(0).toUpperCase() + words.slice(1);
}

function OneFinding({ finding }: { readonly finding: SolutionFinding }) {
  const subject = subjectWords(finding);
  const text = (
    <>
      {subject === '' ? null : <b className="font-medium">{subject}: </b>}
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
