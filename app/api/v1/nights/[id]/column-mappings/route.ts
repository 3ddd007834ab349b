import { listColumnMappings, saveColumnMapping } from '@/lib/contracts/api/measurement-set';
import { saveColumnMapping as save } from '@/lib/server/acts/save-column-mapping';
import { endpoint } from '@/lib/server/http/endpoint';
import { columnMappings } from '@/lib/server/reads/column-mappings';

export const GET = endpoint(listColumnMappings, ({ caller, params }) => columnMappings(caller, params.id));

export const PUT = endpoint(saveColumnMapping, ({ caller, params, body }) => save(caller, params.id, body));
