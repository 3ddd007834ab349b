'use client';

import { useActionState, useEffect, useState, type FormEvent } from 'react';
import { Light, lightCookie, lightCookieAge_s, lightNames, lights } from '@/lib/contracts/light';
import { chooseLight, rememberLight } from './actions';

/** Sets the light of the page as it stands, and remembers it. */
function apply(light: Light): void {
  document.documentElement.dataset['light'] = light;
  document.cookie = `${lightCookie}=${light}; path=/; max-age=${lightCookieAge_s}; samesite=lax`;
  const icon = document.querySelector<HTMLLinkElement>('link[rel="icon"]');
  if (icon !== null) icon.href = light === 'dark-site' ? '/icon-dark-site.svg' : '/icon.svg';
  const ground = getComputedStyle(document.documentElement).getPropertyValue('--ground').trim();
  document.querySelector('meta[name="theme-color"]')?.setAttribute('content', ground);
}

/** Paper is white: print in Day, whatever light the screen is in. */
function usePrintInDay(light: Light): void {
  useEffect(() => {
    const root = document.documentElement;
    const before = () => (root.dataset['light'] = 'day');
    const after = () => (root.dataset['light'] = light);
    addEventListener('beforeprint', before);
    addEventListener('afterprint', after);
    return () => {
      removeEventListener('beforeprint', before);
      removeEventListener('afterprint', after);
    };
  }, [light]);
}

interface LightSwitchProps {
  readonly initial: Light;
  /** Their light is remembered with the account too. */
  readonly isSignedIn: boolean;
}

export function LightSwitch({ initial, isSignedIn }: LightSwitchProps) {
  const [light, setLight] = useState(initial);
  const [, send] = useActionState(chooseLight, null);
  usePrintInDay(light);
  const choose = (event: FormEvent<HTMLFormElement>) => {
    const submitter = (event.nativeEvent as SubmitEvent).submitter;
    const chosen = Light.safeParse(submitter?.getAttribute('value'));
    if (!chosen.success) return;
    event.preventDefault();
    apply(chosen.data);
    setLight(chosen.data);
    // Over a broken link the light still holds in this browser, by its cookie; that is all there is to say.
    if (isSignedIn) rememberLight(chosen.data).catch(() => undefined);
  };
  return (
    <form action={send} onSubmit={choose} role="group" aria-label="Light" className="no-print flex">
      {lights.map((each) => (
        <button
          key={each}
          type="submit"
          name="light"
          value={each}
          aria-pressed={each === light}
          className="min-h-6 border border-l-0 border-rule-strong px-2 text-small text-ink-2 last:rounded-r-control first-of-type:rounded-l-control first-of-type:border-l hover:text-ink focus-visible:relative focus-visible:z-10 aria-pressed:bg-accent aria-pressed:font-medium aria-pressed:text-accent-ink"
        >
          {lightNames[each]}
        </button>
      ))}
    </form>
  );
}
