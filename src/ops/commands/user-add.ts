/* npm run stillfield -- user-add E-MAIL NAME ROLE ORGANISATION [--generate]: enters a person who can sign in. */

import { Op } from 'sequelize';
import { SERVER } from '@/auth/actor';
import type { Role } from '@/auth/permissions';
import { NotFound } from '@/errors';
import { Organisation } from '@/models/organisation';
import { unitOfWork } from '@/models/unitOfWork';
import { createUser } from '@/services/users';
import { askPassword, generatedPassword, runCommand, Usage } from '../commandLine';

const USAGE = 'user-add E-MAIL NAME manager|technician|designer ORGANISATION [--generate]';
const ROLES: readonly string[] = ['manager', 'technician', 'designer'] satisfies Role[];

/** By public id, name or short name. */
async function findOrganisation(named: string): Promise<string> {
  const found = await unitOfWork(() =>
    Organisation.findAll({
      where: { [Op.or]: [{ publicId: named }, { name: named }, { shortName: named }] },
      limit: 2,
    }),
  );
  if (found.length !== 1) throw new NotFound(found.length === 0 ? 'organisation' : 'single organisation of that name');
  return found[0]!.publicId;
}

export async function main(args: string[]): Promise<void> {
  const generate = args.includes('--generate');
  const [email, name, role, organisation, ...rest] = args.filter((arg) => arg !== '--generate');
  if (!email || !name || !role || !ROLES.includes(role) || !organisation || rest.length > 0) throw new Usage(USAGE);
  const organisationId = await findOrganisation(organisation);
  const password = generate ? generatedPassword() : await askPassword();
  const { publicId } = await createUser(SERVER, { organisationId, role: role as Role, name, email, password });
  if (generate) process.stdout.write(`${password}\n`);
  process.stderr.write(`${name} can sign in as ${email} (${role}, ${publicId}).\n`);
}

if (require.main === module) void runCommand(main);
