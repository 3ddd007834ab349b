'use client';

import { Suspense, type ComponentProps } from 'react';
import { NightBand } from '@/app/_components/charts/night-band/night-band';
import { useNow } from '@/app/_components/hooks/use-now';
import { useStretch } from '@/app/_components/hooks/use-stretch';

interface AddressedBandProps extends Omit<ComponentProps<typeof NightBand>, 'now' | 'selected' | 'onSelect'> {
  /** The server's clock when it made the page, ms. */
  readonly serverNow: number;
}

function Band({ serverNow, ...band }: AddressedBandProps) {
  const [selected, select] = useStretch();
  const now = useNow(serverNow, 60_000);
  return <NightBand {...band} now={now} selected={selected} onSelect={select} />;
}

/** The night band with its selection in the page's address, and the present minute on it. */
export function AddressedBand(props: AddressedBandProps) {
  return (
    <Suspense>
      <Band {...props} />
    </Suspense>
  );
}
