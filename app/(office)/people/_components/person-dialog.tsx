'use client';

import { ActionForm } from '@/app/_components/ui/action-form';
import { Button } from '@/app/_components/ui/button';
import { Dialog } from '@/app/_components/ui/dialog';
import { Field } from '@/app/_components/ui/field';
import { SecretOnce } from '@/app/_components/ui/secret-once';
import { TextInput } from '@/app/_components/ui/text-input';
import { linkLife_hours, type PersonListed } from '@/lib/contracts/people';
import { changePersonAction, makePersonLinkAction } from '../actions';
import { RoleTicks } from './role-ticks';

interface PersonDialogProps {
  readonly person: PersonListed;
  readonly onClose: () => void;
}

/** Name and roles of a person, and a new one-time link for who lost the password or the first link. */
export function PersonDialog({ person, onClose }: PersonDialogProps) {
  return (
    <Dialog open onClose={onClose} title={person.name}>
      <div className="grid gap-5">
        <ActionForm
          action={changePersonAction}
          fields={['name', 'roles']}
          label={`Change ${person.name}`}
          onDone={onClose}
          className="grid gap-3"
        >
          {({ isPending, issue, typed }) => (
            <>
              <input type="hidden" name="person" value={person.publicId} />
              <Field label="Name" required error={issue('name')}>
                {(control) => (
                  <TextInput {...control} name="name" defaultValue={typed('name', person.name)} />
                )}
              </Field>
              <RoleTicks checked={person.roles} error={issue('roles')} />
              <div>
                <Button type="submit" look="primary" busy={isPending} busyLabel="Saving…">
                  Save
                </Button>
              </div>
            </>
          )}
        </ActionForm>
        {person.state === 'disabled' ? null : (
          <ActionForm
            action={makePersonLinkAction}
            fields={[]}
            label="One-time link"
            className="grid gap-2 border-t border-rule pt-3"
          >
            {({ isPending, result }) => (
              <>
                <input type="hidden" name="person" value={person.publicId} />
                <p className="text-ink-2">
                  Lost password, or an invitation that ran out: a new link lets the person set a password. It
                  is mailed too.
                </p>
                <div>
                  <Button type="submit" busy={isPending} busyLabel="Making…">
                    Make a one-time link
                  </Button>
                </div>
                {result?.ok ? (
                  <SecretOnce secret={result.value.link}>
                    {`Shown here once. It works once, within ${linkLife_hours} hours.`}
                  </SecretOnce>
                ) : null}
              </>
            )}
          </ActionForm>
        )}
      </div>
    </Dialog>
  );
}
