'use client';

import { useEffect } from 'react';
import { markResultsSeenAction } from '../actions';

interface MarkSeenProps {
  readonly night: string;
  readonly programme: string;
}

/** Says once that these results were opened. Not part of reading the page: a page that is only fetched ahead was not seen. */
export function MarkSeen({ night, programme }: MarkSeenProps) {
  useEffect(() => {
    // When it fails the results stay new, which harms nobody.
    void markResultsSeenAction({ night, programme });
  }, [night, programme]);
  return null;
}
