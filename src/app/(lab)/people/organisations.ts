import type { Actor } from '@/auth/actor';
import { listOrganisations } from '@/services/organisations';
import { readMe } from '@/services/sessions';

export interface OrganisationChoice {
  id: string;
  name: string;
  kind: 'lab' | 'client';
}

/** The lab itself, then its clients by name. */
export async function organisationChoices(manager: Actor): Promise<OrganisationChoice[]> {
  const clients: OrganisationChoice[] = [];
  for (let after: string | undefined; ;) {
    const page = await listOrganisations(manager, { limit: 200, after });
    clients.push(...page.items);
    if (page.next === null) break;
    after = page.next;
  }
  const { organisation: lab } = await readMe(manager);
  return [{ ...lab, kind: 'lab' }, ...clients.sort((a, b) => a.name.localeCompare(b.name, 'en'))];
}
