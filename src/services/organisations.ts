import { authorise, authoriseCommander, type Actor, type Commander, personOf, SERVER } from '@/auth/actor';
import { Conflict } from '@/errors';
import { Organisation } from '@/models/organisation';
import { newPublicId } from '@/models/publicId';
import { Setting } from '@/models/setting';
import { unitOfWork } from '@/models/unitOfWork';
import { recordChange } from './audit';
import type { LabSettings } from './lab';
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

/** Enters a client organisation; managers only, at a browser or on the server. */
export async function enterClient(by: Commander | null, name: string, at = new Date()): Promise<Organisation> {
  authoriseCommander(by, 'organisation.enter');
  return unitOfWork(() => write(by, 'client', name, at));
}

/** Sets up the one lab of this database with its settings. Conflict when there is one already. */
export async function enterLab(settings: LabSettings, at = new Date()): Promise<Organisation> {
  return unitOfWork(async () => {
    const lab = await Organisation.findOne({ where: { kind: 'lab' } });
    if (lab) throw new Conflict(`This database already belongs to ${lab.name}.`);
    await Setting.create({ name: 'lab', value: settings });
    return write(SERVER, 'lab', settings.name, at);
  });
}

async function write(by: Commander, kind: 'lab' | 'client', name: string, at: Date): Promise<Organisation> {
  const shortName = name.split(' ').slice(0, 2).join(' ');
  const row = await Organisation.create({ publicId: newPublicId(), kind, name, shortName, createdAt: at });
  recordChange(personOf(by), {
    scope: 'lab',
    action: `${kind} ${name} entered`,
    subjectType: 'organisation',
    subjectId: row.publicId,
    before: null,
    after: { kind, name },
    at,
  });
  return row;
}
