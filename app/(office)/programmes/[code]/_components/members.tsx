'use client';

import { ActButton } from '@/app/_components/ui/act-button';
import { ActionForm } from '@/app/_components/ui/action-form';
import { Button } from '@/app/_components/ui/button';
import { Field } from '@/app/_components/ui/field';
import { Panel } from '@/app/_components/ui/panel';
import { Select } from '@/app/_components/ui/select';
import { programmeRoles, roleNames, type ProgrammeRole } from '@/lib/contracts/roles';
import { removeMemberAction, setMemberAction } from '../../actions';

interface Member {
  readonly person: string;
  readonly name: string;
  readonly email: string;
  readonly role: ProgrammeRole;
  readonly isDisabled: boolean;
}

interface MembersProps {
  readonly programme: string;
  readonly members: readonly Member[];
  readonly people: readonly { readonly publicId: string; readonly name: string; readonly email: string }[];
  readonly mayManage: boolean;
}

export function Members({ programme, members, people, mayManage }: MembersProps) {
  return (
    <Panel title="Investigators">
      {members.length === 0 ? (
        <p className="text-ink-2">Nobody yet: until somebody is named, only staff see the data.</p>
      ) : (
        <ul className="grid gap-3">
          {members.map((member) => (
            <li key={member.person} className="flex flex-wrap items-start justify-between gap-2">
              <span>
                {member.name}{' '}
                {member.isDisabled ? <span className="text-warn">(account disabled)</span> : null}
                <span className="block text-small text-ink-2">
                  {roleNames[member.role]}, {member.email}
                </span>
              </span>
              {mayManage ? <MemberActs programme={programme} member={member} /> : null}
            </li>
          ))}
        </ul>
      )}
      {mayManage ? <AddMember programme={programme} people={people} /> : null}
    </Panel>
  );
}

function MemberActs({ programme, member }: { readonly programme: string; readonly member: Member }) {
  const other = member.role === 'pi' ? 'coinvestigator' : 'pi';
  return (
    <span className="flex gap-2">
      <ActButton
        action={setMemberAction}
        values={{ programme, person: member.person, role: other }}
        label={`Make ${member.name} ${roleNames[other]}`}
      >
        {other === 'pi' ? 'Make PI' : 'Make co-I'}
      </ActButton>
      <ActButton
        action={removeMemberAction}
        values={{ programme, person: member.person }}
        label={`Remove ${member.name}`}
        confirm={{
          title: `Remove ${member.name} from the programme?`,
          text: 'Access to the programme’s data ends at once.',
          yes: 'Remove',
        }}
      >
        Remove
      </ActButton>
    </span>
  );
}

function AddMember({ programme, people }: Pick<MembersProps, 'programme' | 'people'>) {
  if (people.length === 0) {
    return (
      <p className="mt-3 text-small text-ink-2">
        Everybody with an account is a member. Invite people first.
      </p>
    );
  }
  return (
    <ActionForm
      action={setMemberAction}
      fields={['person', 'role']}
      label="Add an investigator"
      resets
      className="mt-3 grid gap-3 border-t border-rule pt-3"
    >
      {({ isPending, issue }) => (
        <>
          <input type="hidden" name="programme" value={programme} />
          <Field label="Person" required error={issue('person')}>
            {(control) => (
              <Select
                {...control}
                name="person"
                choices={people.map(({ publicId, name, email }) => ({
                  value: publicId,
                  label: `${name}, ${email}`,
                }))}
              />
            )}
          </Field>
          <Field label="As" required error={issue('role')}>
            {(control) => (
              <Select
                {...control}
                name="role"
                defaultValue="coinvestigator"
                choices={programmeRoles.map((role) => ({ value: role, label: roleNames[role] }))}
              />
            )}
          </Field>
          <div>
            <Button type="submit" busy={isPending} busyLabel="Adding…">
              Add
            </Button>
          </div>
        </>
      )}
    </ActionForm>
  );
}
