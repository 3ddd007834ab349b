import { BandMark } from '@/app/_components/ui/band-mark';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { Figure } from '@/app/_components/ui/figure';
import { formatCount, formatPlain } from '@/lib/contracts/format-figure';
import { KeyValues } from '@/app/_components/ui/key-values';
import { Panel } from '@/app/_components/ui/panel';
import { bands, type Band } from '@/lib/contracts/bands';
import type { ColourTerms } from '@/lib/contracts/equipment';
import { FiltersDialog } from './filters-dialog';
import {
  CameraDialog,
  EpochDialog,
  TelescopeDialog,
  type CameraValues,
  type EpochValues,
  type TelescopeValues,
} from './telescope-dialogs';

export interface TelescopeOnPage extends TelescopeValues {
  readonly cameras: readonly CameraValues[];
  readonly filters: readonly {
    readonly band: Band;
    readonly name: string;
    readonly defaultExposure: number | null;
  }[];
  readonly epochs: readonly EpochValues[];
}

interface TelescopePanelProps {
  readonly telescope: TelescopeOnPage;
  readonly sites: readonly string[];
  readonly mayManage: boolean;
}

export function TelescopePanel({ telescope, sites, mayManage }: TelescopePanelProps) {
  const { code, cameras, filters, epochs } = telescope;
  return (
    <section aria-label={telescope.name} className="grid gap-4">
      <div className="grid items-start gap-4 lg:grid-cols-2">
        <Panel
          title={telescope.name}
          note={code}
          actions={mayManage ? <TelescopeDialog telescope={telescope} sites={sites} /> : undefined}
        >
          <KeyValues
            items={[
              { key: 'Site', value: telescope.site },
              { key: 'Aperture', value: `${formatPlain(telescope.aperture_m)} m`, figure: true },
              { key: 'Lowest pointing', value: `${formatPlain(telescope.minAltitude)}°`, figure: true },
              { key: 'In use', value: telescope.retiredOn === null ? 'yes' : `until ${telescope.retiredOn}` },
            ]}
          />
        </Panel>
        <Panel
          title="Filters"
          actions={mayManage ? <FiltersDialog telescope={code} filters={filters} /> : undefined}
        >
          {filters.length === 0 ? (
            <p className="text-ink-2">None yet: the log needs to know the bands.</p>
          ) : (
            <KeyValues
              items={filters.map(({ band, name, defaultExposure }) => ({
                key: `${band}`,
                value: (
                  <>
                    <BandMark band={band} /> {name}
                    {defaultExposure === null ? '' : `, usually ${formatPlain(defaultExposure)} s`}
                  </>
                ),
              }))}
            />
          )}
        </Panel>
      </div>
      <Cameras telescope={code} cameras={cameras} mayManage={mayManage} />
      <Epochs telescope={telescope} epochs={epochs} mayManage={mayManage} />
    </section>
  );
}

interface CamerasProps {
  readonly telescope: string;
  readonly cameras: readonly CameraValues[];
  readonly mayManage: boolean;
}

function Cameras({ telescope, cameras, mayManage }: CamerasProps) {
  return (
    <Panel
      title="Cameras"
      flush
      actions={mayManage ? <CameraDialog telescope={telescope} camera={null} /> : undefined}
    >
      {cameras.length === 0 ? (
        <p className="px-3.5 py-3 text-ink-2">None yet.</p>
      ) : (
        <DataTable
          caption={`Cameras of ${telescope}`}
          head={
            <tr>
              <HeadCell>Name</HeadCell>
              <HeadCell numeric unit="pixels">
                Size
              </HeadCell>
              <HeadCell numeric unit="arcsec per pixel">
                Scale
              </HeadCell>
              <HeadCell numeric unit="e⁻ per count">
                Gain
              </HeadCell>
              <HeadCell numeric unit="e⁻">
                Read noise
              </HeadCell>
              <HeadCell numeric unit="counts">
                Saturation
              </HeadCell>
              {mayManage ? <HeadCell aria-label="Actions" /> : null}
            </tr>
          }
        >
          {cameras.map((camera) => (
            <Row key={camera.name}>
              <Cell heading>{camera.name}</Cell>
              <Cell numeric>
                {formatCount(camera.width_px)} × {formatCount(camera.height_px)}
              </Cell>
              <Cell numeric>{formatPlain(camera.pixelScale)}</Cell>
              <Cell numeric>{formatPlain(camera.gain)}</Cell>
              <Cell numeric>{formatPlain(camera.readNoise)}</Cell>
              <Cell numeric>{formatCount(camera.saturation)}</Cell>
              {mayManage ? (
                <Cell>
                  <CameraDialog telescope={telescope} camera={camera} />
                </Cell>
              ) : null}
            </Row>
          ))}
        </DataTable>
      )}
    </Panel>
  );
}

interface EpochsProps {
  readonly telescope: TelescopeOnPage;
  readonly epochs: readonly EpochValues[];
  readonly mayManage: boolean;
}

function Epochs({ telescope: { code, cameras }, epochs, mayManage }: EpochsProps) {
  const names = cameras.map(({ name }) => name);
  return (
    <Panel
      title="Equipment epochs"
      note="spans in which mirror, camera and filters stayed the same"
      flush
      actions={
        mayManage && names.length > 0 ? (
          <EpochDialog telescope={code} cameras={names} epoch={null} />
        ) : undefined
      }
    >
      {epochs.length === 0 ? (
        <p className="px-3.5 py-3 text-ink-2">
          None yet. Nights of one epoch share their colour terms; begin one when mirror, camera or filters
          change.
        </p>
      ) : (
        <DataTable
          caption={`Equipment epochs of ${code}`}
          head={
            <tr>
              <HeadCell>From</HeadCell>
              <HeadCell>Until</HeadCell>
              <HeadCell>Camera</HeadCell>
              <HeadCell>What began</HeadCell>
              <HeadCell unit="mag per mag">Recorded colour terms</HeadCell>
              {mayManage ? <HeadCell aria-label="Actions" /> : null}
            </tr>
          }
        >
          {epochs.map((epoch) => (
            <Row key={epoch.startsOn} className="align-top">
              <Cell mono>{epoch.startsOn}</Cell>
              <Cell mono>{epoch.endsOn ?? 'now'}</Cell>
              <Cell>{epoch.camera}</Cell>
              <Cell wrap>{epoch.description}</Cell>
              <Cell>
                <Terms terms={epoch.colourTerms} />
              </Cell>
              {mayManage ? (
                <Cell>
                  <EpochDialog telescope={code} cameras={names} epoch={epoch} />
                </Cell>
              ) : null}
            </Row>
          ))}
        </DataTable>
      )}
    </Panel>
  );
}

function Terms({ terms }: { readonly terms: ColourTerms }) {
  const known = bands.flatMap((band) => {
    const term = terms[band];
    return term === undefined ? [] : [{ band, ...term }];
  });
  if (known.length === 0) return <span className="text-ink-2">none</span>;
  return (
    <ul>
      {known.map(({ band, value, error }) => (
        <li key={band}>
          <BandMark band={band} /> {band} <Figure value={value} error={error} />
        </li>
      ))}
    </ul>
  );
}
