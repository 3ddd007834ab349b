import 'server-only';
import { nightBounds } from '@/lib/astro/night-bounds';
import type { Night, OpenNight } from '@/lib/contracts/api/night';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction, type Tx } from '@/lib/server/data/database';
import { instrumentByCode, lockInstrument, type InstrumentRow } from '@/lib/server/data/instruments';
import { insertNight, nightOfDate, observersByPublicId, setObservers } from '@/lib/server/data/night-writes';
import { requireNight, toNight } from '@/lib/server/data/nights';
import { newPublicId } from '@/lib/server/data/public-id';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';

/** Opens the night of a telescope and a date; whoever opens it is its observer, unless others are named. */
export async function openNight(caller: PersonCaller, input: OpenNight): Promise<Night> {
  demand(caller, 'night.open');
  const instrument = await usableInstrument(input.telescope);
  const bounds = nightBounds(input.date, instrument.timezone);
  const publicId = newPublicId();
  return inTransaction(async (tx) => {
    await lockInstrument(tx, instrument.id);
    await refuseSecond(tx, instrument, input.date);
    const nightId = await insertNight(tx, {
      publicId,
      telescopeId: instrument.id,
      date: input.date,
      startsAt: new Date(bounds.start),
      endsAt: new Date(bounds.end),
      openedById: caller.personId,
    });
    const named = await observersByPublicId(tx, input.observers ?? []);
    await setObservers(
      tx,
      nightId,
      named.length === 0 ? [caller.personId] : named.map(({ personId }) => personId),
    );
    const night = toNight(await requireNight(nightScope(caller), publicId, tx));
    await recordAudit(tx, caller, {
      act: 'night.open',
      subjectKind: 'night',
      subjectId: publicId,
      nightId,
      after: { telescope: night.telescope, date: night.date, observers: night.observers },
    });
    return night;
  });
}

async function usableInstrument(code: string): Promise<InstrumentRow> {
  const instrument = await instrumentByCode(code);
  const issue = (message: string): Fault =>
    new Fault('invalid-input', `${code} ${message}.`, {
      issues: [{ path: 'telescope', value: code, message }],
    });
  if (!instrument) throw issue('is not the code of a telescope here');
  if (instrument.retiredOn !== null) throw issue(`was retired on ${instrument.retiredOn}`);
  return instrument;
}

async function refuseSecond(tx: Tx, instrument: InstrumentRow, date: string): Promise<void> {
  const first = await nightOfDate(tx, instrument.id, date);
  if (!first) return;
  const when = first.createdAt.toISOString().slice(0, 16).replace('T', ' ');
  throw new Fault(
    'conflict',
    `The night of ${date} on ${instrument.name} is there already: ${first.openedBy} opened it at ${when} UTC.`,
    { issues: [{ path: 'id', value: first.publicId, message: 'is the night that exists: go on in it' }] },
  );
}
