'use client';

import { useRouter } from 'next/navigation';
import { useState, type ReactNode } from 'react';
import { callApi, type ApiResult } from '@/app/_components/hooks/call-api';
import { useApiCall } from '@/app/_components/hooks/use-api-call';
import { Button, type ButtonLook } from '@/app/_components/ui/button';
import { Checkbox } from '@/app/_components/ui/checkbox';
import { Dialog } from '@/app/_components/ui/dialog';
import { ErrorNotice } from '@/app/_components/ui/error-notice';
import { Field } from '@/app/_components/ui/field';
import { TextArea } from '@/app/_components/ui/text-area';
import {
  approveSolution,
  proposeSolution,
  withdrawSolution,
  type Solution,
} from '@/lib/contracts/api/solution';
import { verdicts, type Verdict } from '@/lib/photometry/night-evidence';

export interface StateDialogProps {
  readonly solution: Solution;
  readonly onClose: () => void;
}

interface CommentDialogProps {
  readonly onClose: () => void;
  readonly title: string;
  readonly yes: string;
  readonly look: ButtonLook;
  readonly label: string;
  readonly hint?: string;
  /** Why the comment will not do; null where it will. */
  readonly fault?: (comment: string) => string | null;
  readonly send: (comment: string) => Promise<ApiResult<Solution>>;
  readonly children: ReactNode;
}

/** Changes the state of a solution, with a comment. Whatever comes of it, the page then shows how it stands. */
function CommentDialog(props: CommentDialogProps) {
  const { title, yes, look, label, hint, fault, send, onClose, children } = props;
  const router = useRouter();
  const [comment, setComment] = useState('');
  const [error, setError] = useState<string | null>(null);
  const { isBusy, refusal, run } = useApiCall();
  const act = async () => {
    const wrong = fault?.(comment) ?? null;
    setError(wrong);
    if (wrong !== null) return;
    const done = await run(send(comment));
    router.refresh();
    if (done !== null) onClose();
  };
  return (
    <Dialog
      open
      onClose={onClose}
      title={title}
      actions={
        <Button look={look} busy={isBusy} onClick={() => void act()}>
          {yes}
        </Button>
      }
    >
      <div className="grid gap-3">
        {refusal === null ? null : <ErrorNotice fault={refusal} />}
        {children}
        <Field label={label} hint={hint} error={error} required={fault !== undefined}>
          {(control) => (
            <TextArea
              {...control}
              rows={3}
              maxLength={2000}
              value={comment}
              onChange={(event) => setComment(event.target.value)}
            />
          )}
        </Field>
      </div>
    </Dialog>
  );
}

export function ProposeDialog({ solution, onClose }: StateDialogProps) {
  const [verdict, setVerdict] = useState<Verdict | null>(solution.verdict ?? solution.suggested_verdict);
  return (
    <CommentDialog
      onClose={onClose}
      title={`Propose solution ${solution.number} for approval`}
      yes="Propose"
      look="primary"
      label="Comment"
      hint="For whoever approves; kept with the solution."
      send={(comment) =>
        callApi(proposeSolution, {
          params: { id: solution.id },
          body: { comment, version: solution.version, ...(verdict === null ? {} : { verdict }) },
        })
      }
    >
      <fieldset className="grid gap-1">
        <legend className="mb-1 text-small text-ink-2">Your verdict on the night</legend>
        {verdicts.map((one) => (
          <Checkbox
            key={one}
            radio
            name="verdict"
            label={one}
            {...(one === solution.suggested_verdict ? { hint: 'The evidence suggests this.' } : {})}
            checked={one === verdict}
            onChange={() => setVerdict(one)}
          />
        ))}
      </fieldset>
    </CommentDialog>
  );
}

export function ApproveDialog({
  solution,
  onClose,
  effect,
}: StateDialogProps & { readonly effect: ReactNode }) {
  return (
    <CommentDialog
      onClose={onClose}
      title={`Approve solution ${solution.number}`}
      yes="Approve"
      look="primary"
      label="Comment"
      hint="Kept with the solution."
      send={(comment) =>
        callApi(approveSolution, {
          params: { id: solution.id },
          body: { comment, version: solution.version },
        })
      }
    >
      <p>
        {solution.proposed === null ? null : `${solution.proposed.name} proposed it`}
        {solution.verdict === null ? null : `, and calls the night ${solution.verdict}`}.
      </p>
      {effect}
    </CommentDialog>
  );
}

export function WithdrawDialog({ solution, onClose }: StateDialogProps) {
  return (
    <CommentDialog
      onClose={onClose}
      title={`Withdraw solution ${solution.number}`}
      yes="Withdraw the solution"
      look="bad"
      label="Why"
      fault={(comment) =>
        comment.trim().length < 3 ? 'Say why, in a few words; the reason is kept with the solution.' : null
      }
      send={(comment) =>
        callApi(withdrawSolution, {
          params: { id: solution.id },
          body: { comment: comment.trim().replaceAll(/\s+/g, ' '), version: solution.version },
        })
      }
    >
      <p>
        {solution.state === 'approved'
          ? 'Its magnitudes are no longer given out, and the night waits for another solution.'
          : 'It stays to be read, but can no longer be approved.'}{' '}
        This cannot be undone; the night can be solved again at any time.
      </p>
    </CommentDialog>
  );
}
