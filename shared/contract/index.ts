import type { Endpoint } from './endpoint';
import * as analysis from './analysis';
import * as benches from './benches';
import * as dispositions from './dispositions';
import * as health from './health';
import * as history from './history';
import * as holds from './holds';
import * as lots from './lots';
import * as mail from './mail';
import * as parts from './parts';
import * as people from './people';
import * as receivers from './receivers';
import * as session from './session';
import * as suppliers from './suppliers';
import * as uploads from './uploads';
import * as work from './work';

export const areas = {
  session,
  people,
  suppliers,
  parts,
  receivers,
  benches,
  lots,
  uploads,
  analysis,
  dispositions,
  holds,
  history,
  mail,
  work,
  health,
};

function isEndpoint(value: unknown): value is Endpoint {
  return (
    typeof value === 'object' &&
    value !== null &&
    'method' in value &&
    'path' in value &&
    'roles' in value
  );
}

/** Every endpoint with its name and area; OpenAPI and the role matrix are made from this list. */
export const endpoints: { area: string; name: string; endpoint: Endpoint }[] = Object.entries(
  areas,
).flatMap(([area, module]) =>
  Object.entries(module).flatMap(([name, value]) =>
    isEndpoint(value) ? [{ area, name, endpoint: value as Endpoint }] : [],
  ),
);
