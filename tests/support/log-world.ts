import { randomUUID } from 'node:crypto';
import type { ObservatoryRole, ProgrammeRole } from '@/lib/contracts/roles';
import { execute, insert } from '@/lib/server/data/database';
import { newPublicId } from '@/lib/server/data/public-id';
import { callerOfPerson } from '@/lib/server/data/callers';
import { tokenScopes, type PersonCaller, type TokenScope } from '@/lib/server/policy/caller';
import { starKey } from '@/lib/contracts/star-name';

/** An observatory with one telescope (`larkspur`, U to I), a retired one, and two programmes with a target each. */
export interface LogWorld {
  readonly telescopeId: number;
  /** MH26B-04, target “Thistle 3”. */
  readonly thistle: number;
  /** MH26B-11, target “LV Marrow”. */
  readonly marrow: number;
}

export async function newLogWorld(): Promise<LogWorld> {
  const observatory = await insert(
    `INSERT INTO observatories (name, settings) VALUES ('Marrow Hill Observatory', '{}')`,
    {},
    null,
  );
  const site = await insert(
    `INSERT INTO sites (observatory_id, name, longitude, latitude, elevation, timezone, mean_extinction)
     VALUES (:observatory, 'Marrow Hill', -17.25, 28.31, 2300, 'Atlantic/Canary', '{}')`,
    { observatory },
    null,
  );
  const telescopeId = await newTelescope(site, { code: 'larkspur', name: 'Larkspur 0.8 m', retiredOn: null });
  await newTelescope(site, { code: 'old-larkspur', name: 'Old Larkspur', retiredOn: '2020-01-01' });
  const thistle = await newProgramme('MH26B-04', 'Thistle 3', { ra: 83.5, decl: 22.1 });
  const marrow = await newProgramme('MH26B-11', 'LV Marrow', { ra: 12.25, decl: 41.2 });
  return { telescopeId, thistle, marrow };
}

interface NewTelescope {
  readonly code: string;
  readonly name: string;
  readonly retiredOn: string | null;
}

async function newTelescope(siteId: number, telescope: NewTelescope): Promise<number> {
  const id = await insert(
    `INSERT INTO telescopes (site_id, code, name, aperture_m, min_altitude, retired_on)
     VALUES (:siteId, :code, :name, 0.8, 15, :retiredOn)`,
    { siteId, ...telescope },
    null,
  );
  for (const band of ['U', 'B', 'V', 'R', 'I']) {
    await insert(
      `INSERT INTO filters (telescope_id, band, name, default_exposure) VALUES (:id, :band, :band, 30)`,
      { id, band },
      null,
    );
  }
  return id;
}

export async function newProgramme(
  code: string,
  target: string,
  place: { readonly ra: number; readonly decl: number },
): Promise<number> {
  const id = await insert(
    `INSERT INTO programmes (public_id, code, title, summary) VALUES (:publicId, :code, :code, '')`,
    { publicId: newPublicId(), code },
    null,
  );
  await insert(
    `INSERT INTO programme_targets (programme_id, name, name_key, kind, ra, decl)
     VALUES (:id, :target, :key, 'star', :ra, :decl)`,
    { id, target, key: starKey(target), ...place },
    null,
  );
  return id;
}

interface NewCaller {
  readonly roles?: readonly ObservatoryRole[];
  readonly programmes?: readonly (readonly [number, ProgrammeRole])[];
  readonly scopes?: readonly TokenScope[];
}

/** A person with roles, as the caller that signs in. */
export async function newCaller(name: string, rights: NewCaller = {}): Promise<PersonCaller> {
  const personId = await insert(
    'INSERT INTO people (public_id, email, name) VALUES (:publicId, :email, :name)',
    { publicId: newPublicId(), email: `${randomUUID()}@evenfall.example`, name },
    null,
  );
  for (const role of rights.roles ?? []) {
    await execute('INSERT INTO person_roles VALUES (:personId, :role)', { personId, role }, null);
  }
  for (const [programme, role] of rights.programmes ?? []) {
    await execute(
      'INSERT INTO programme_members VALUES (:programme, :personId, :role)',
      { programme, personId, role },
      null,
    );
  }
  const row = await callerOfPerson(personId);
  if (!row) throw new Error('A person who was just made is not there.');
  return {
    kind: 'person',
    ...row,
    roles: new Set(row.roles),
    programmes: new Map(row.programmes),
    via: 'session',
    scopes: new Set(rights.scopes ?? tokenScopes),
    requestId: randomUUID(),
  };
}

/** People by name, each made with these rights. */
export async function newCallers(
  people: Readonly<Record<string, NewCaller>>,
): Promise<(name: string) => PersonCaller> {
  const callers = new Map<string, PersonCaller>();
  for (const [name, rights] of Object.entries(people)) callers.set(name, await newCaller(name, rights));
  return (name) => {
    const caller = callers.get(name);
    if (!caller) throw new Error(`There is no ${name}.`);
    return caller;
  };
}

/** Three stars of a field that lies across 0 h, and one that must not be used. */
export async function newStandards(): Promise<void> {
  const source = await insert(
    `INSERT INTO standard_sources (code, citation, note, default_error) VALUES ('test', 'A test', '', 0.01)`,
    {},
    null,
  );
  const stars = [
    { name: 'ZZ 1 A', field: 'ZZ 1', ra: 359.5, decl: 10, usable: 1 },
    { name: 'ZZ 1 B', field: 'ZZ 1', ra: 0.5, decl: 10, usable: 1 },
    { name: 'ZZ 1 X', field: 'ZZ 1', ra: 120, decl: -60, usable: 0 },
    { name: 'SA 98-1', field: 'SA 98', ra: 103, decl: -0.3, usable: 1 },
  ];
  for (const star of stars) {
    await insert(
      `INSERT INTO standard_stars (source_id, name, name_key, field, ra, decl, v, bv, is_usable)
       VALUES (:source, :name, :key, :field, :ra, :decl, 12, 0.5, :usable)`,
      { source, ...star, key: starKey(star.name) },
      null,
    );
  }
}
