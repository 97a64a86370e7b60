import { UniqueConstraintError } from 'sequelize';
import type { z } from 'zod';
import { authorise, visibleOrganisation, type Actor } from '@/auth/actor';
import { Conflict, Invalid, NotFound } from '@/errors';
import { Organisation } from '@/models/organisation';
import { Product } from '@/models/product';
import { newPublicId } from '@/models/publicId';
import { unitOfWork } from '@/models/unitOfWork';
import type { changeProductBody, createProductBody, ProductView } from '@/schemas/job';
import { recordChange } from './audit';
import { olderThan, pageFrom, type PageRequest } from './paging';
import { changeVersioned } from './versions';

type WithOrganisation = Product & { organisation: Organisation };

function view(row: Product): ProductView {
  const { organisation } = row as WithOrganisation;
  const { publicId: id, version, code, name, description } = row;
  return { id, version, code, name, description, organisation: { id: organisation.publicId, name: organisation.name } };
}

/** A product the actor may see, or NotFound. */
export async function findProduct(actor: Actor, publicId: string): Promise<Product> {
  const row = await Product.findOne({ where: { publicId }, include: ['organisation'] });
  const own = visibleOrganisation(actor);
  if (!row || (own !== null && row.organisationId !== own)) throw new NotFound('product');
  return row;
}

export async function listProducts(actor: Actor | null, page: PageRequest) {
  authorise(actor, 'product.list');
  const own = visibleOrganisation(actor);
  return unitOfWork(async () => {
    const rows = await Product.findAll({
      where: { ...olderThan(page), ...(own !== null && { organisationId: own }) },
      include: ['organisation'],
      order: [['id', 'DESC']],
      limit: page.limit + 1,
    });
    return pageFrom(rows, page, view);
  });
}

export async function readProduct(actor: Actor | null, publicId: string): Promise<ProductView> {
  authorise(actor, 'product.read');
  return unitOfWork(async () => view(await findProduct(actor, publicId)));
}

const CODE_TAKEN = 'This organisation already has a product with that code.';

export async function createProduct(
  actor: Actor | null,
  body: z.infer<typeof createProductBody>,
): Promise<ProductView> {
  authorise(actor, 'product.create');
  return unitOfWork(async () => {
    const organisation = await Organisation.findOne({ where: { publicId: body.organisationId, kind: 'client' } });
    if (!organisation) throw new Invalid([{ pointer: '/organisationId', message: 'is not a client of this lab' }]);
    const { code, name, description } = body;
    const row = await codeIsFree(() =>
      Product.create({ publicId: newPublicId(), organisationId: organisation.id, code, name, description }),
    );
    recordChange(actor, {
      scope: 'lab',
      action: 'product entered',
      subjectType: 'product',
      subjectId: row.publicId,
      before: null,
      after: { organisation: organisation.publicId, code, name, description },
    });
    return view(Object.assign(row, { organisation }));
  });
}

export async function changeProduct(
  actor: Actor | null,
  publicId: string,
  version: number,
  body: z.infer<typeof changeProductBody>,
): Promise<ProductView> {
  authorise(actor, 'product.change');
  return unitOfWork(async () => {
    const row = await findProduct(actor, publicId);
    const before = { code: row.code, name: row.name, description: row.description };
    await codeIsFree(() => changeVersioned(Product, row, version, body, 'product'));
    recordChange(actor, {
      scope: 'lab',
      action: 'product changed',
      subjectType: 'product',
      subjectId: publicId,
      before,
      after: { ...before, ...body },
    });
    return view(await findProduct(actor, publicId));
  });
}

async function codeIsFree<T>(write: () => Promise<T>): Promise<T> {
  try {
    return await write();
  } catch (error) {
    if (error instanceof UniqueConstraintError) throw new Conflict(CODE_TAKEN);
    throw error;
  }
}
