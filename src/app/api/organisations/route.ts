import { handle } from '@/http/handle';
import * as operations from '@/schemas/job';
import { listOrganisations } from '@/services/organisations';

export const GET = handle(operations.listOrganisations, ({ actor, query }) => listOrganisations(actor, query));
