'use client';

import { ActionForm } from '@/app/_components/ui/action-form';
import { Button } from '@/app/_components/ui/button';
import { Field } from '@/app/_components/ui/field';
import { TextInput } from '@/app/_components/ui/text-input';
import { passwordMin } from '@/lib/contracts/password';
import { acceptLinkAction } from '../actions';

interface PasswordFormProps {
  readonly token: string;
  /** For password keepers, which store a password under an account's name. */
  readonly email: string;
}

export function PasswordForm({ token, email }: PasswordFormProps) {
  return (
    <ActionForm
      action={acceptLinkAction}
      fields={['password', 'repeated']}
      label="Set a password"
      className="grid gap-3"
    >
      {({ isPending, issue }) => (
        <>
          <input type="hidden" name="token" value={token} />
          <input type="email" name="username" value={email} autoComplete="username" readOnly hidden />
          <Field
            label="New password"
            required
            error={issue('password')}
            hint={`At least ${passwordMin} characters. Several words in a row are easy to keep in mind.`}
          >
            {(control) => (
              <TextInput {...control} name="password" type="password" autoComplete="new-password" autoFocus />
            )}
          </Field>
          <Field label="The same again" required error={issue('repeated')}>
            {(control) => (
              <TextInput {...control} name="repeated" type="password" autoComplete="new-password" />
            )}
          </Field>
          <div>
            <Button type="submit" look="primary" busy={isPending} busyLabel="Setting the password…">
              Set the password and sign in
            </Button>
          </div>
        </>
      )}
    </ActionForm>
  );
}
