'use client';

import { ActionForm } from '@/app/_components/ui/action-form';
import { Button } from '@/app/_components/ui/button';
import { Field } from '@/app/_components/ui/field';
import { TextInput } from '@/app/_components/ui/text-input';
import { signInAction } from '../actions';

/** E-mail address and password. `next` is where the person was going. */
export function SignInForm({ next }: { readonly next: string }) {
  return (
    <ActionForm action={signInAction} fields={['email', 'password']} label="Sign in" className="grid gap-3">
      {({ isPending, issue, typed }) => (
        <>
          <Field label="E-mail address" required error={issue('email')}>
            {(control) => (
              <TextInput
                {...control}
                name="email"
                type="email"
                inputMode="email"
                autoComplete="username"
                autoCapitalize="none"
                autoFocus
                defaultValue={typed('email')}
              />
            )}
          </Field>
          <Field label="Password" required error={issue('password')}>
            {(control) => (
              <TextInput {...control} name="password" type="password" autoComplete="current-password" />
            )}
          </Field>
          <input type="hidden" name="next" value={next} />
          <div>
            <Button type="submit" look="primary" busy={isPending} busyLabel="Signing in…">
              Sign in
            </Button>
          </div>
        </>
      )}
    </ActionForm>
  );
}
