'use client';

import { useState } from 'react';
import { ActButton } from '@/app/_components/ui/act-button';
import { Button } from '@/app/_components/ui/button';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { Panel } from '@/app/_components/ui/panel';
import { formatDeclination, formatRightAscension } from '@/lib/astro/format-sexagesimal';
import { removeTargetAction } from '../../actions';
import { TargetDialog, type TargetValues } from './target-dialog';

interface TargetsProps {
  readonly programme: string;
  readonly targets: readonly TargetValues[];
  readonly mayManage: boolean;
}

const blank: TargetValues = { name: '', kind: 'star', ra: null, dec: null, note: '' };

export function Targets({ programme, targets, mayManage }: TargetsProps) {
  const [edited, setEdited] = useState<TargetValues | null>(null);
  const add = mayManage ? <Button onClick={() => setEdited(blank)}>Add a target</Button> : undefined;
  return (
    <Panel title="Targets" note="places complete the log’s object names" flush actions={add}>
      {targets.length === 0 ? (
        <EmptyState title="No targets yet">
          With its coordinates here, a target’s frames get their airmass as they are logged.
        </EmptyState>
      ) : (
        <DataTable
          caption="Targets"
          head={
            <tr>
              <HeadCell>Name</HeadCell>
              <HeadCell>Kind</HeadCell>
              <HeadCell numeric unit="J2000">
                Right ascension
              </HeadCell>
              <HeadCell numeric unit="J2000">
                Declination
              </HeadCell>
              <HeadCell>Note</HeadCell>
              {mayManage ? (
                <HeadCell>
                  <span className="sr-only">Actions</span>
                </HeadCell>
              ) : null}
            </tr>
          }
        >
          {targets.map((target) => (
            <Row key={target.name}>
              <Cell heading>{target.name}</Cell>
              <Cell>{target.kind}</Cell>
              <Cell numeric>{target.ra === null ? '' : formatRightAscension(target.ra)}</Cell>
              <Cell numeric>{target.dec === null ? '' : formatDeclination(target.dec)}</Cell>
              <Cell wrap>{target.note}</Cell>
              {mayManage ? (
                <Cell>
                  <span className="flex gap-2">
                    <Button onClick={() => setEdited(target)} aria-label={`Change ${target.name}`}>
                      Change
                    </Button>
                    <ActButton
                      action={removeTargetAction}
                      values={{ programme, target: target.name }}
                      label={`Remove ${target.name}`}
                      confirm={{
                        title: `Remove ${target.name}?`,
                        text: 'Frames of it keep their object and coordinates.',
                        yes: 'Remove',
                      }}
                    >
                      Remove
                    </ActButton>
                  </span>
                </Cell>
              ) : null}
            </Row>
          ))}
        </DataTable>
      )}
      {edited === null ? null : (
        <TargetDialog programme={programme} target={edited} onClose={() => setEdited(null)} />
      )}
    </Panel>
  );
}
