import type { Route } from 'next';
import { Tabs } from '@/app/_components/ui/tabs';

/** What of a field decides in which views it is. */
interface ViewedField {
  readonly nUsable: number;
  readonly tonight: object | null;
}

const views = ['all', 'groups', 'tonight'] as const;
type View = (typeof views)[number];

const labels: Readonly<Record<View, string>> = {
  all: 'All fields',
  groups: 'With three stars or more',
  tonight: 'Observable tonight',
};

/** Groups serve an extinction and colour solution; a single star serves a check. */
const fewestOfGroup = 3;

export const viewOf = (text: string | undefined): View => views.find((view) => view === text) ?? 'all';

export function shownFields<T extends ViewedField>(fields: readonly T[], view: View): readonly T[] {
  switch (view) {
    case 'all':
      return fields;
    case 'groups':
      return fields.filter(({ nUsable }) => nUsable >= fewestOfGroup);
    case 'tonight':
      return fields.filter(({ nUsable, tonight }) => nUsable >= fewestOfGroup && tonight !== null);
  }
}

interface FieldTabsProps {
  readonly view: View;
  readonly fields: readonly ViewedField[];
  readonly telescope: string | undefined;
}

export function FieldTabs({ view, fields, telescope }: FieldTabsProps) {
  const href = (show: View): Route => {
    const query = new URLSearchParams({ ...(telescope && { telescope }), ...(show !== 'all' && { show }) });
    return `/standards${query.size === 0 ? '' : `?${query}`}` as Route;
  };
  return (
    <Tabs
      label="Which fields"
      tabs={views.map((each) => ({
        href: href(each),
        label: labels[each],
        count: String(shownFields(fields, each).length),
        isCurrent: each === view,
      }))}
    />
  );
}
