import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { formatDeclination, formatRightAscension } from '@/lib/astro/format-sexagesimal';
import { LinkButton } from '@/app/_components/ui/link-button';
import { PageHead } from '@/app/_components/ui/page-head';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { standardField } from '@/lib/server/reads/standard-field';
import { SourcePanel } from '../_components/source-panel';
import { FieldStars } from './_components/field-stars';
import { TonightLine } from './_components/tonight-line';

const one = (value: string | string[] | undefined): string | undefined =>
  Array.isArray(value) ? value[0] : value;

/** A server's page is made once, at its time. */
async function presentTime(): Promise<number> {
  return Date.now();
}

async function pageOf({ params, searchParams }: PageProps<'/standards/[field]'>) {
  const caller = await callerOrSignIn();
  const [{ field }, query] = await Promise.all([params, searchParams]);
  const now = await presentTime();
  const page = await standardField(caller, decodeURIComponent(field), {
    telescope: one(query['telescope']),
    now,
  });
  return page === null ? null : { ...page, star: one(query['star']) };
}

export async function generateMetadata(props: PageProps<'/standards/[field]'>): Promise<Metadata> {
  const page = await pageOf(props);
  return { title: page === null ? 'Standards' : page.field.name };
}

export default async function FieldPage(props: PageProps<'/standards/[field]'>) {
  const page = await pageOf(props);
  if (page === null) notFound();
  const { field, stars, sources } = page;
  return (
    <>
      <PageHead title={field.name} actions={<LinkButton href="/standards">All fields</LinkButton>}>
        <span className="text-ink-2">
          {field.nStars === 1 ? 'One standard star' : `${field.nStars} standard stars`} around{' '}
          <span className="font-mono">
            {formatRightAscension(field.ra, 0)} {formatDeclination(field.dec, 0)}
          </span>
        </span>
      </PageHead>
      <TonightLine tonight={field.tonight} telescope={page.telescope} night={page.night} />
      <FieldStars stars={stars} initial={page.star} />
      <SourcePanel sources={sources} />
    </>
  );
}
