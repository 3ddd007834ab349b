'use client';

import type { Route } from 'next';
import { usePathname } from 'next/navigation';
import { Tabs } from '@/app/_components/ui/tabs';
import { useNight } from './night-provider';

/** Parts of the night. Each is added here together with its page. */
export function NightTabs() {
  const { log } = useNight();
  const pathname = usePathname();
  const home = `/nights/${log.night.id}`;
  const tabs = [
    { href: home as Route, label: 'Log', count: String(log.frames.length) },
    { href: `${home}/measurements` as Route, label: 'Measurements', ...countOf(log.sets) },
    { href: `${home}/solutions` as Route, label: 'Solutions' },
    { href: `${home}/results` as Route, label: 'Results' },
  ];
  return (
    <Tabs
      label="Parts of the night"
      tabs={tabs.map((tab) => ({ ...tab, isCurrent: pathname === tab.href }))}
    />
  );
}

/** As the tab says it: `3 sets`. Where they are not the reader's to see it says nothing. */
const countOf = (sets: number | null): { readonly count?: string } =>
  sets === null ? {} : { count: sets === 1 ? '1 set' : `${sets} sets` };
