import 'server-only';
import type { Me } from '@/lib/contracts/api/me';
import { programmeCodes } from '@/lib/server/data/programmes';
import type { PersonCaller } from '@/lib/server/policy/caller';

/** Who the caller is, in the form of the HTTP interface. */
export async function readMe(caller: PersonCaller): Promise<Me> {
  const codes = await programmeCodes([...caller.programmes.keys()]);
  const programmes = [...codes].flatMap(([id, { code, title }]) => {
    const role = caller.programmes.get(id);
    return role === undefined ? [] : [{ code, title, role }];
  });
  return {
    id: caller.publicId,
    name: caller.name,
    email: caller.email,
    roles: [...caller.roles],
    programmes,
    via: caller.via,
    scopes: [...caller.scopes],
  };
}
