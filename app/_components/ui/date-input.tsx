'use client';

import type { ComponentProps, KeyboardEvent } from 'react';
import { TextInput } from './text-input';

const calendarDate = /^(\d{4})-(\d{2})-(\d{2})$/;

/** The date so many days on, in the form it came in; null when it is no date. */
export function shiftDate(date: string, days: number): string | null {
  const parts = calendarDate.exec(date);
  if (parts === null) return null;
  const shifted = new Date(Date.UTC(Number(parts[1]), Number(parts[2]) - 1, Number(parts[3]) + days));
  return shifted.toISOString().slice(0, 10);
}

/**
 * A calendar date as ISO text. The native picker is white on every system; here the arrow keys go by days and, with
 * Page Up and Page Down, by weeks.
 */
export function DateInput({ onKeyDown, ...rest }: Omit<ComponentProps<'input'>, 'type'>) {
  const step = (event: KeyboardEvent<HTMLInputElement>) => {
    onKeyDown?.(event);
    const days = { ArrowUp: 1, ArrowDown: -1, PageUp: 7, PageDown: -7 }[event.key];
    if (days === undefined) return;
    const shifted = shiftDate(event.currentTarget.value, days);
    if (shifted === null) return;
    event.preventDefault();
    // Through the native setter, so that a controlled parent hears of it as of typing.
    const setter = Object.getOwnPropertyDescriptor(HTMLInputElement.prototype, 'value')?.set;
    setter?.call(event.currentTarget, shifted);
    event.currentTarget.dispatchEvent(new Event('input', { bubbles: true }));
  };
  return (
    <TextInput mono inputMode="numeric" placeholder="2026-11-03" maxLength={10} {...rest} onKeyDown={step} />
  );
}
