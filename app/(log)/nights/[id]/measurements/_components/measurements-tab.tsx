'use client';

import { useRouter } from 'next/navigation';
import { useCallback } from 'react';
import type { MeasurementSet, SavedMapping } from '@/lib/contracts/api/measurement-set';
import { useNight } from '../../_components/night-provider';
import { SetList } from './set-list';
import { UploadPanel } from './upload-panel';

interface MeasurementsTabProps {
  readonly sets: readonly MeasurementSet[];
  readonly mayUpload: boolean;
  readonly mappings: readonly SavedMapping[];
  readonly limit_bytes: number;
}

export function MeasurementsTab({ sets, mayUpload, mappings, limit_bytes }: MeasurementsTabProps) {
  const { log, reload } = useNight();
  const router = useRouter();
  /** Something of the night's sets has changed; a set can also bring frames into the log. */
  const refresh = useCallback(() => {
    router.refresh();
    void reload();
  }, [router, reload]);
  return (
    <div className="grid grid-cols-1 gap-5">
      {mayUpload ? (
        <UploadPanel
          night={log.night.id}
          telescope={log.telescope.name}
          mappings={mappings}
          limit_bytes={limit_bytes}
          onChange={refresh}
        />
      ) : null}
      <SetList sets={sets} mayUpload={mayUpload} onEnd={refresh} />
    </div>
  );
}
