'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { callApi } from '@/app/_components/hooks/call-api';
import { useApiCall } from '@/app/_components/hooks/use-api-call';
import { Button } from '@/app/_components/ui/button';
import { ErrorNotice } from '@/app/_components/ui/error-notice';
import { Field } from '@/app/_components/ui/field';
import { formatInstant } from '@/app/_components/ui/format-time';
import { Panel } from '@/app/_components/ui/panel';
import { TextArea } from '@/app/_components/ui/text-area';
import { addSolutionComment, type SolutionComment } from '@/lib/contracts/api/solution';

interface CommentPanelProps {
  readonly solution: string;
  readonly comments: readonly SolutionComment[];
  readonly mayComment: boolean;
}

const acts: Readonly<Record<SolutionComment['act'], string>> = {
  comment: '',
  propose: ' proposed it',
  approve: ' approved it',
  withdraw: ' withdrew it',
};

/** What people said about the solution, the oldest first. */
export function CommentPanel({ solution, comments, mayComment }: CommentPanelProps) {
  return (
    <Panel title="Comments">
      {comments.length === 0 ? <p className="text-ink-2">Nobody has said anything yet.</p> : null}
      <ul className="grid gap-3">
        {comments.map(({ act, text, by, at }, index) => (
          <li key={index}>
            <p className="text-small text-ink-2">
              <b className="font-medium text-ink">{by}</b>
              {acts[act]}, {formatInstant(at)}
            </p>
            {text === '' ? null : <p className="wrap-anywhere whitespace-pre-wrap">{text}</p>}
          </li>
        ))}
      </ul>
      {mayComment ? <AddComment solution={solution} /> : null}
    </Panel>
  );
}

function AddComment({ solution }: { readonly solution: string }) {
  const router = useRouter();
  const [text, setText] = useState('');
  const { isBusy, refusal, run, refuse } = useApiCall();
  const add = async () => {
    if (text.trim() === '') return refuse('Write something first.');
    const done = await run(callApi(addSolutionComment, { params: { id: solution }, body: { text } }));
    if (done === null) return;
    setText('');
    router.refresh();
  };
  return (
    <form
      noValidate
      aria-label="Add a comment"
      className="mt-3 grid gap-2"
      onSubmit={(event) => {
        event.preventDefault();
        void add();
      }}
    >
      {refusal === null ? null : <ErrorNotice fault={refusal} />}
      <Field label="Comment" required>
        {(control) => (
          <TextArea
            {...control}
            rows={2}
            maxLength={2000}
            value={text}
            onChange={(event) => setText(event.target.value)}
          />
        )}
      </Field>
      <span>
        <Button type="submit" busy={isBusy}>
          Add the comment
        </Button>
      </span>
    </form>
  );
}
