import { authorise, type Actor } from '@/auth/actor';
import { Organisation } from '@/models/organisation';
import { unitOfWork } from '@/models/unitOfWork';
import { olderThan, pageFrom, type PageRequest } from './paging';

export async function listOrganisations(actor: Actor | null, page: PageRequest) {
  authorise(actor, 'organisation.list');
  return unitOfWork(async () => {
    const rows = await Organisation.findAll({
      where: { kind: 'client', ...olderThan(page) },
      order: [['id', 'DESC']],
      limit: page.limit + 1,
    });
    return pageFrom(rows, page, (row) => ({ id: row.publicId, name: row.name, kind: row.kind }));
  });
}
