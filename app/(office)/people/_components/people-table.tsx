'use client';

import { useState } from 'react';
import { ActButton } from '@/app/_components/ui/act-button';
import { Button } from '@/app/_components/ui/button';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { formatInstant } from '@/app/_components/ui/format-time';
import { StateTag } from '@/app/_components/ui/state-tag';
import type { PersonListed } from '@/lib/contracts/people';
import { roleNames } from '@/lib/contracts/roles';
import { disablePersonAction, enablePersonAction } from '../actions';
import { PersonDialog } from './person-dialog';

interface PeopleTableProps {
  readonly people: readonly PersonListed[];
  readonly mayManage: boolean;
  /** The caller's own public id: one does not lock oneself out by a slip. */
  readonly own: string;
}

export function PeopleTable({ people, mayManage, own }: PeopleTableProps) {
  const [edited, setEdited] = useState<PersonListed | null>(null);
  return (
    <>
      <DataTable
        caption="People"
        head={
          <tr>
            <HeadCell>Name</HeadCell>
            <HeadCell>Roles</HeadCell>
            <HeadCell>Programmes</HeadCell>
            <HeadCell>State</HeadCell>
            <HeadCell>Last sign-in</HeadCell>
            {mayManage ? (
              <HeadCell>
                <span className="sr-only">Actions</span>
              </HeadCell>
            ) : null}
          </tr>
        }
      >
        {people.map((person) => (
          <Row key={person.publicId} className={person.state === 'disabled' ? 'text-ink-2' : undefined}>
            <Cell heading className="font-medium">
              {person.name}
              <span className="block text-small font-normal text-ink-2">{person.email}</span>
            </Cell>
            <Cell>{person.roles.map((role) => roleNames[role]).join(', ')}</Cell>
            <Cell wrap>
              {person.programmes.map(({ code, role }) => (
                <span key={code} className="mr-3 inline-block whitespace-nowrap">
                  <span className="font-mono">{code}</span>{' '}
                  <span className="text-small text-ink-2">{roleNames[role]}</span>
                </span>
              ))}
            </Cell>
            <Cell>
              <StateTag state={person.state} />
            </Cell>
            <Cell mono>{person.lastSignIn === null ? '' : formatInstant(person.lastSignIn)}</Cell>
            {mayManage ? (
              <Cell>
                <span className="flex gap-2">
                  <Button onClick={() => setEdited(person)} aria-label={`Change ${person.name}`}>
                    Change
                  </Button>
                  <EnableOrDisable person={person} isOwn={person.publicId === own} />
                </span>
              </Cell>
            ) : null}
          </Row>
        ))}
      </DataTable>
      {edited === null ? null : <PersonDialog person={edited} onClose={() => setEdited(null)} />}
    </>
  );
}

function EnableOrDisable({ person, isOwn }: { readonly person: PersonListed; readonly isOwn: boolean }) {
  const values = { person: person.publicId };
  if (person.state === 'disabled') {
    return (
      <ActButton
        action={enablePersonAction}
        values={values}
        label={`Enable ${person.name}`}
        busyLabel="Enabling…"
      >
        Enable
      </ActButton>
    );
  }
  if (isOwn) return null;
  return (
    <ActButton
      action={disablePersonAction}
      values={values}
      label={`Disable ${person.name}`}
      busyLabel="Disabling…"
      confirm={{
        title: `Disable the account of ${person.name}?`,
        text: 'Sessions and API tokens end at once. What the person logged, uploaded and decided stays.',
        yes: 'Disable',
      }}
    >
      Disable
    </ActButton>
  );
}
