import { standingOf } from '@/app/_components/solutions/solution-words';
import { Finding } from '@/app/_components/ui/finding';
import { formatDateInWords } from '@/app/_components/ui/format-time';
import { Panel } from '@/app/_components/ui/panel';
import type { Solution } from '@/lib/contracts/api/solution';
import type { SolutionPage } from '@/lib/contracts/solution-page';
import { ApprovalPanel } from './approval-panel';
import { solutionBefore } from '@/app/_components/solutions/coefficient-change';
import { CoefficientPanel } from './coefficient-panel';
import { CommentPanel } from './comment-panel';
import { EvidencePanel } from './evidence-panel';
import { FindingList } from './finding-list';
import { HistoryPanel } from './history-panel';
import { SolutionDesk } from './solution-desk';
import { NotFinished, Solving } from './unsolved';

/** A solution in two columns: the observations, and what was made of them. */
export function SolutionView({ page }: { readonly page: SolutionPage }) {
  const { solution, comments } = page;
  return (
    <div className="grid grid-cols-1 gap-5 lg:grid-cols-[minmax(0,1fr)_minmax(380px,25%)]">
      <div className="grid min-w-0 grid-cols-1 content-start gap-5">
        <Main page={page} />
      </div>
      <aside className="grid min-w-0 grid-cols-1 content-start gap-5">
        {solution.outcome === null ? null : <Found page={page} />}
        <ApprovalPanel page={page} />
        <CommentPanel solution={solution.id} comments={comments} mayComment={solution.may.comment} />
        <HistoryPanel page={page} />
      </aside>
    </div>
  );
}

function Main({ page }: { readonly page: SolutionPage }) {
  const { solution } = page;
  switch (standingOf(solution)) {
    case 'running':
      return <Solving solution={solution} />;
    case 'not finished':
      return <NotFinished solution={solution} />;
    case 'undetermined':
      return (
        <>
          <Finding tone="bad" word="Not determined">
            The observations cannot determine every coefficient, so no number is given for those. What stands
            in the way, and what would help, is said below.
          </Finding>
          <Panel title="Findings">
            <FindingList findings={solution.findings} isJoint={solution.joint_nights.length > 0} />
          </Panel>
          {solution.n_observations === 0 ? null : <Desk page={page} />}
        </>
      );
    case 'solved':
      return <Desk page={page} />;
  }
}

/** More bands than the narrow column has room for go into the wide one. */
const mostNarrow = 2;
const isWide = ({ bands }: Solution): boolean => Object.keys(bands).length > mostNarrow;

function Desk({ page }: { readonly page: SolutionPage }) {
  const { solution } = page;
  return (
    <SolutionDesk key={solution.id} solution={solution}>
      {isWide(solution) ? <Coefficients page={page} /> : null}
    </SolutionDesk>
  );
}

function Coefficients({ page: { solution, solutions } }: { readonly page: SolutionPage }) {
  const former = solutionBefore(solution, solutions);
  return (
    <>
      <CoefficientPanel
        title="Coefficients"
        found={solution.bands}
        before={former === null ? null : { number: former.number, found: former.bands }}
      />
      {solution.joint_nights.map(({ night, date, bands }) => (
        <CoefficientPanel
          key={night}
          title={`Coefficients, ${formatDateInWords(date)}`}
          found={bands}
          before={null}
        />
      ))}
    </>
  );
}

function Found({ page }: { readonly page: SolutionPage }) {
  const { solution } = page;
  return (
    <>
      {isWide(solution) ? null : <Coefficients page={page} />}
      <EvidencePanel solution={solution} />
      {solution.findings.length === 0 || solution.outcome === 'undetermined' ? null : (
        <Panel title="Findings">
          <FindingList findings={solution.findings} isJoint={solution.joint_nights.length > 0} />
        </Panel>
      )}
    </>
  );
}
