'use client';

import { ActionForm } from '@/app/_components/ui/action-form';
import { Button } from '@/app/_components/ui/button';
import { Field } from '@/app/_components/ui/field';
import { TextInput } from '@/app/_components/ui/text-input';
import { passwordMin } from '@/lib/contracts/password';
import { changePasswordAction } from '../actions';

const ended = (count: number): string =>
  count === 0 ? '' : ` ${count === 1 ? 'One other session was' : `${count} other sessions were`} signed out.`;

export function PasswordForm({ email }: { readonly email: string }) {
  return (
    <ActionForm
      action={changePasswordAction}
      fields={['current', 'password', 'repeated']}
      label="Change the password"
      resets
      className="grid gap-3"
    >
      {({ isPending, issue, result }) => (
        <>
          <input type="email" name="username" value={email} autoComplete="username" readOnly hidden />
          <Field label="Present password" required error={issue('current')}>
            {(control) => (
              <TextInput {...control} name="current" type="password" autoComplete="current-password" />
            )}
          </Field>
          <Field
            label="New password"
            required
            error={issue('password')}
            hint={`At least ${passwordMin} characters. Your other sessions are signed out.`}
          >
            {(control) => (
              <TextInput {...control} name="password" type="password" autoComplete="new-password" />
            )}
          </Field>
          <Field label="The new one again" required error={issue('repeated')}>
            {(control) => (
              <TextInput {...control} name="repeated" type="password" autoComplete="new-password" />
            )}
          </Field>
          <div className="flex flex-wrap items-center gap-3">
            <Button type="submit" busy={isPending} busyLabel="Changing…">
              Change the password
            </Button>
            <span role="status" className="text-small text-ink-2">
              {result?.ok ? `Changed.${ended(result.value.sessionsEnded)}` : ''}
            </span>
          </div>
        </>
      )}
    </ActionForm>
  );
}
