'use client';

import { ActionForm } from '@/app/_components/ui/action-form';
import { Button } from '@/app/_components/ui/button';
import { Field } from '@/app/_components/ui/field';
import { SecretOnce } from '@/app/_components/ui/secret-once';
import { TextInput } from '@/app/_components/ui/text-input';
import { linkLife_hours } from '@/lib/contracts/people';
import { invitePersonAction } from '../actions';
import { RoleTicks } from './role-ticks';

export function InviteForm() {
  return (
    <ActionForm
      action={invitePersonAction}
      fields={['email', 'name', 'roles']}
      label="Invite somebody"
      resets
      className="grid gap-3"
    >
      {({ isPending, issue, typed, result }) => (
        <>
          <Field label="E-mail" required error={issue('email')}>
            {(control) => <TextInput {...control} type="email" name="email" defaultValue={typed('email')} />}
          </Field>
          <Field label="Name" required error={issue('name')}>
            {(control) => <TextInput {...control} name="name" defaultValue={typed('name')} />}
          </Field>
          <RoleTicks checked={[]} error={issue('roles')} />
          <div>
            <Button type="submit" look="primary" busy={isPending} busyLabel="Inviting…">
              Invite
            </Button>
          </div>
          {result?.ok ? (
            <SecretOnce secret={result.value.link}>
              {`The link is mailed, and shown here once. It works once, within ${linkLife_hours} hours.`}
            </SecretOnce>
          ) : null}
        </>
      )}
    </ActionForm>
  );
}
