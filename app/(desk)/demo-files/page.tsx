import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { formatBytes } from '@/lib/contracts/format-figure';
import { formatDateInWords } from '@/app/_components/ui/format-time';
import { PageHead } from '@/app/_components/ui/page-head';
import { Panel } from '@/app/_components/ui/panel';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { offeredDemoFiles } from '@/lib/server/reads/demo-files';

export const metadata: Metadata = { title: 'Sample files' };

export default async function DemoFilesPage() {
  const files = await offeredDemoFiles(await callerOrSignIn());
  if (files === null) notFound();
  return (
    <>
      <PageHead title="Sample files" />
      <p className="mb-4 max-w-prose text-ink-2">
        Tables of instrumental magnitudes to try uploads with: download one, then upload it on the page of its
        night. All are made by a forward model of the invented telescope; nothing in them was observed.
      </p>
      <Panel flush>
        <DataTable
          caption="Sample files of the demonstration"
          head={
            <Row>
              <HeadCell>File</HeadCell>
              <HeadCell>Night</HeadCell>
              <HeadCell>What it is for</HeadCell>
              <HeadCell numeric>Size</HeadCell>
            </Row>
          }
        >
          {files.map(({ name, night, about, size_bytes }) => (
            <Row key={name}>
              <Cell heading mono>
                <a href={`/demo-files/${name}`} download={name}>
                  {name}
                </a>
              </Cell>
              <Cell>{night === null ? 'in progress' : formatDateInWords(night)}</Cell>
              <Cell wrap className="min-w-80">
                {about}
              </Cell>
              <Cell numeric>{formatBytes(size_bytes)}</Cell>
            </Row>
          ))}
        </DataTable>
      </Panel>
    </>
  );
}
