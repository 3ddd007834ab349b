import Link from 'next/link';
import type { Route } from 'next';
import { buttonClass } from '@/app/_components/ui/button';
import { formatDateInWords } from '@/app/_components/ui/format-time';
import { PageHead } from '@/app/_components/ui/page-head';
import { StateTag } from '@/app/_components/ui/state-tag';
import type { SetPage } from '@/lib/contracts/set-page';
import { CheckAgain } from './check-again';
import { TakeBack } from './take-back';

const kinds = { standard: 'Standards', target: 'Targets', mixed: 'Standards and targets' } as const;

export function SetHead({ page: { set, telescopeName } }: { readonly page: SetPage }) {
  return (
    <PageHead
      title={set.name}
      actions={
        <>
          {set.may_check ? <CheckAgain set={set.id} /> : null}
          {set.is_whole ? (
            <a href={`/api/v1/measurement-sets/${set.id}/original`} download className={buttonClass()}>
              Original file
            </a>
          ) : null}
          {set.may_refuse ? <TakeBack set={set.id} name={set.name} /> : null}
        </>
      }
    >
      <StateTag state={set.state} />
      <span className="text-ink-2">
        {kinds[set.kind]} of the night of{' '}
        <Link href={`/nights/${set.night}/measurements` as Route}>{formatDateInWords(set.night_date)}</Link>,{' '}
        {telescopeName}
      </span>
    </PageHead>
  );
}
