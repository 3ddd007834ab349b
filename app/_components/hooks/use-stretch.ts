'use client';

import { useSearchParams } from 'next/navigation';
import { useCallback, useMemo } from 'react';
import { stretchOf, withStretch, type AddressStretch } from './stretch-address';

/**
 * The selected stretch of the night, kept in the address (`?from=&to=`): a reload, a link and the way back keep it.
 * Choosing one does not ask the server again.
 */
export function useStretch(): readonly [AddressStretch | null, (stretch: AddressStretch | null) => void] {
  const params = useSearchParams();
  const stretch = useMemo(() => stretchOf(params), [params]);
  const select = useCallback((chosen: AddressStretch | null) => {
    const query = withStretch(window.location.search, chosen);
    window.history.replaceState(null, '', `${window.location.pathname}${query === '' ? '' : `?${query}`}`);
  }, []);
  return [stretch, select];
}
