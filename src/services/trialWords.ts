import { Op } from 'sequelize';
import { authorise, type Actor } from '@/auth/actor';
import { Sweep } from '@/models/sweep';
import { unitOfWork } from '@/models/unitOfWork';

const LOOKED_AT = 200;
const MOST = 20;

/** How the lab named its latest trials, newest first, each once; for the lab's own people. */
export async function listTrialWords(actor: Actor | null): Promise<string[]> {
  authorise(actor, 'sweep.keep');
  const rows = await unitOfWork(() =>
    Sweep.findAll({
      where: { trial: { [Op.not]: null } },
      attributes: ['trial'],
      order: [['id', 'DESC']],
      limit: LOOKED_AT,
    }),
  );
  return [...new Set(rows.map(({ trial }) => trial!))].slice(0, MOST);
}
