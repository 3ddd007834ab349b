'use client';

import { ActButton } from '@/app/_components/ui/act-button';
import { openNightAction } from '../nights/actions';

/** Opens the night of one telescope and date. */
export function OpenNightButton({ telescope, date }: { readonly telescope: string; readonly date: string }) {
  return (
    <ActButton action={openNightAction} values={{ telescope, date }} look="primary" busyLabel="Opening…">
      Open tonight’s night
    </ActButton>
  );
}
