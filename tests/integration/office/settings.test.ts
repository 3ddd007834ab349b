import { beforeEach, describe, expect, it } from 'vitest';
import { ChangeSettings, defaultSettings } from '@/lib/contracts/settings';
import { changeSettings } from '@/lib/server/acts/change-settings';
import { execute, select } from '@/lib/server/data/database';
import { observatorySettings } from '@/lib/server/reads/settings';
import { faultOf } from '@/tests/support/fault-of';
import { newCaller, newObservatory } from '@/tests/support/people';

const { verdict, ...others } = defaultSettings;
const input = { name: 'Test', ...others, ...verdict };

describe('the settings', () => {
  beforeEach(async () => {
    await execute('DELETE FROM audit_events', {}, null);
    await execute('DELETE FROM observatories', {}, null);
    await newObservatory();
  });

  it('have their defaults before anybody changed them', async () => {
    const manager = await newCaller({ roles: ['manager'] });
    expect(await observatorySettings(manager)).toEqual({ name: 'Test', settings: defaultSettings });
  });

  it('are changed by a manager, and the audit trail keeps what differs only', async () => {
    const manager = await newCaller({ roles: ['manager'] });
    await changeSettings(manager, { ...input, scatterV: 0.015, secondApprover: false });
    const { settings } = await observatorySettings(manager);
    expect(settings).toMatchObject({ secondApprover: false, verdict: { scatterV: 0.015, scatterB: 0.03 } });
    const [row] = await select<{ before: object; after: object }>(
      "SELECT before_values AS `before`, after_values AS `after` FROM audit_events WHERE act = 'settings.change'",
    );
    expect(row).toEqual({
      before: { secondApprover: true, scatterV: 0.02 },
      after: { secondApprover: false, scatterV: 0.015 },
    });
  });

  it('saved unchanged leave no row', async () => {
    const manager = await newCaller({ roles: ['manager'] });
    await changeSettings(manager, input);
    expect(await select('SELECT id FROM audit_events')).toEqual([]);
  });

  it.each(['photometrist', 'observer'] as const)('are neither seen nor changed by a %s', async (role) => {
    const caller = await newCaller({ roles: [role] });
    expect((await faultOf(observatorySettings(caller))).code).toBe('not-allowed');
    expect((await faultOf(changeSettings(caller, input))).code).toBe('not-allowed');
  });

  it('refuse a limit for “not photometric” below those for “photometric”', () => {
    const form = {
      name: 'Test',
      proprietaryMonths: '12',
      scatterV: '0.02',
      scatterB: '0.03',
      notPhotometric: '0.025',
      driftSigma: '3',
    };
    const parsed = ChangeSettings.safeParse(form);
    expect(parsed.error?.issues.map(({ path }) => path)).toEqual([['notPhotometric']]);
  });
});
