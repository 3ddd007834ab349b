import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { operations } from '@/lib/contracts/api/operations';
import { callApi } from '../support/api';
import { callers, newRightsWorld, type CallerName, type RightsWorld } from '../support/rights-world';
import { routeRights, type RouteRights } from '../support/route-rights';

let world: RightsWorld;
beforeAll(async () => {
  world = await newRightsWorld();
});
afterAll(() => world.dispose());

/** What the running application makes of the call, as a sign of the table, or as words where no sign fits. */
async function signOf({ operation, call }: RouteRights, caller: CallerName): Promise<string> {
  const token = world.token(caller);
  const sent = await call(world, caller);
  const { status, text } = await callApi(operation, { ...sent, ...(token === undefined ? {} : { token }) });
  if (status < 300 || status === 409) return '+';
  if (status === 403) return '-';
  if (status === 404 || (status === 401 && caller === 'nobody')) return '0';
  return ` [${caller}: ${status} ${text}] `;
}

describe('who may call what', () => {
  it('is said of every operation, once', () => {
    expect(routeRights.map(({ operation }) => operation.id).sort()).toEqual(
      operations.map(({ id }) => id).sort(),
    );
  });

  it.each(routeRights.map((row) => [row.operation.id, row.signs, row] as const))(
    '%s is for %s',
    async (_, signs, row) => {
      let found = '';
      for (const caller of callers) found += await signOf(row, caller);
      expect(found).toBe(signs);
    },
  );
});
