'use client';

import { Field } from '@/app/_components/ui/field';
import { Select } from '@/app/_components/ui/select';
import { bands } from '@/lib/contracts/bands';
import type { ColourTerms } from '@/lib/contracts/equipment';
import { saveCameraAction, saveEpochAction, saveTelescopeAction } from '../actions';
import { BandPairs } from './band-pairs';
import { EditDialog } from './edit-dialog';
import { TextFields } from './text-fields';

export interface TelescopeValues {
  readonly code: string;
  readonly name: string;
  readonly site: string;
  readonly aperture_m: number;
  readonly minAltitude: number;
  readonly retiredOn: string | null;
}

interface TelescopeDialogProps {
  readonly telescope: TelescopeValues | null;
  readonly sites: readonly string[];
}

export function TelescopeDialog({ telescope, sites }: TelescopeDialogProps) {
  const isNew = telescope === null;
  return (
    <EditDialog
      action={saveTelescopeAction}
      title={isNew ? 'Add a telescope' : telescope.name}
      button={isNew ? 'Add a telescope' : 'Change'}
      buttonLabel={isNew ? 'Add a telescope' : `Change ${telescope.name}`}
      hidden={{ telescope: telescope?.code ?? '', ...(isNew ? {} : { code: telescope.code }) }}
      fields={['code', 'name', 'site', 'aperture', 'minAltitude', 'retiredOn']}
    >
      {(state) => (
        <>
          {isNew ? (
            <TextFields
              state={state}
              fields={[
                { name: 'code', label: 'Code', value: '', hint: 'Programs know it by this; it stays.' },
              ]}
            />
          ) : null}
          <TextFields
            state={state}
            fields={[{ name: 'name', label: 'Name', value: telescope?.name ?? '' }]}
          />
          <Field label="Site" required error={state.issue('site')}>
            {(control) => (
              <Select
                {...control}
                name="site"
                defaultValue={state.typed('site', telescope?.site ?? sites[0])}
                choices={sites.map((name) => ({ value: name, label: name }))}
              />
            )}
          </Field>
          <TextFields
            state={state}
            fields={[
              { name: 'aperture', label: 'Aperture, m', value: telescope?.aperture_m ?? 1 },
              { name: 'minAltitude', label: 'Lowest pointing, deg', value: telescope?.minAltitude ?? 15 },
              {
                name: 'retiredOn',
                label: 'Retired on',
                value: telescope?.retiredOn ?? null,
                optional: true,
                hint: 'Empty while it is in use; a date such as 2026-11-03',
              },
            ]}
          />
        </>
      )}
    </EditDialog>
  );
}

export interface CameraValues {
  readonly name: string;
  readonly width_px: number;
  readonly height_px: number;
  readonly pixelScale: number;
  readonly gain: number;
  readonly readNoise: number;
  readonly saturation: number;
}

interface CameraDialogProps {
  readonly telescope: string;
  readonly camera: CameraValues | null;
}

export function CameraDialog({ telescope, camera }: CameraDialogProps) {
  return (
    <EditDialog
      action={saveCameraAction}
      title={camera === null ? 'Add a camera' : camera.name}
      button={camera === null ? 'Add a camera' : 'Change'}
      buttonLabel={camera === null ? `Add a camera to ${telescope}` : `Change ${camera.name}`}
      hidden={{ telescope, camera: camera?.name ?? '' }}
      fields={['name', 'width', 'height', 'pixelScale', 'gain', 'readNoise', 'saturation']}
    >
      {(state) => (
        <TextFields
          state={state}
          fields={[
            { name: 'name', label: 'Name', value: camera?.name ?? '' },
            { name: 'width', label: 'Width, pixels', value: camera?.width_px ?? 2048 },
            { name: 'height', label: 'Height, pixels', value: camera?.height_px ?? 2048 },
            { name: 'pixelScale', label: 'Scale, arcsec per pixel', value: camera?.pixelScale ?? 0.5 },
            { name: 'gain', label: 'Gain, electrons per count', value: camera?.gain ?? 1 },
            { name: 'readNoise', label: 'Read noise, electrons', value: camera?.readNoise ?? 5 },
            {
              name: 'saturation',
              label: 'Saturation, counts',
              value: camera?.saturation ?? 60_000,
              hint: 'A star with a peak at or above it is flagged.',
            },
          ]}
        />
      )}
    </EditDialog>
  );
}

export interface EpochValues {
  readonly startsOn: string;
  readonly endsOn: string | null;
  readonly camera: string;
  readonly description: string;
  readonly colourTerms: ColourTerms;
}

interface EpochDialogProps {
  readonly telescope: string;
  readonly cameras: readonly string[];
  readonly epoch: EpochValues | null;
}

export function EpochDialog({ telescope, cameras, epoch }: EpochDialogProps) {
  return (
    <EditDialog
      action={saveEpochAction}
      title={epoch === null ? 'Add an epoch' : `Epoch from ${epoch.startsOn}`}
      button={epoch === null ? 'Add an epoch' : 'Change'}
      buttonLabel={
        epoch === null ? `Add an epoch of ${telescope}` : `Change the epoch from ${epoch.startsOn}`
      }
      hidden={{ telescope, epoch: epoch?.startsOn ?? '' }}
      fields={[
        'camera',
        'startsOn',
        'endsOn',
        'description',
        ...bands.flatMap((b) => [`term${b}`, `error${b}`]),
      ]}
    >
      {(state) => (
        <>
          <TextFields
            state={state}
            fields={[
              {
                name: 'startsOn',
                label: 'First evening',
                value: epoch?.startsOn ?? '',
                hint: 'As 2026-11-03',
              },
              {
                name: 'endsOn',
                label: 'First evening that no longer belongs to it',
                value: epoch?.endsOn ?? null,
                optional: true,
                hint: 'Empty while it lasts',
              },
            ]}
          />
          <Field label="Camera" required error={state.issue('camera')}>
            {(control) => (
              <Select
                {...control}
                name="camera"
                defaultValue={state.typed('camera', epoch?.camera ?? cameras[0])}
                choices={cameras.map((name) => ({ value: name, label: name }))}
              />
            )}
          </Field>
          <TextFields
            state={state}
            fields={[{ name: 'description', label: 'What began with it', value: epoch?.description ?? '' }]}
          />
          <BandPairs
            state={state}
            legend="Recorded colour terms, mag per mag; a solve may take them as priors"
            names={['term', 'error']}
            values={Object.fromEntries(
              Object.entries(epoch?.colourTerms ?? {}).flatMap(([band, one]) =>
                one === undefined ? [] : [[band, [one.value, one.error] as const]],
              ),
            )}
          />
        </>
      )}
    </EditDialog>
  );
}
