import type { z } from 'zod';
import { authorise, visibleOrganisation, type Actor } from '@/auth/actor';
import { Conflict, NotFound } from '@/errors';
import { Product } from '@/models/product';
import { ProductClock } from '@/models/productClock';
import { newPublicId } from '@/models/publicId';
import { currentTransaction, unitOfWork } from '@/models/unitOfWork';
import type { User } from '@/models/user';
import type { addClockBody, changeClockBody, ClockView } from '@/schemas/clock';
import { recordChange } from './audit';
import { olderThan, pageFrom, type Page, type PageRequest } from './paging';
import { findProduct } from './products';
import { changeVersioned } from './versions';

/** More would explain anything. */
const MOST_CLOCKS = 40;

type Whole = ProductClock & { product: Product; user: User; withdrawer: User | null };
const WHOLE = ['product', 'user', 'withdrawer'];

function view(row: ProductClock): ClockView {
  const { product, user, withdrawer } = row as Whole;
  const { publicId: id, version, name, kind, frequencyHz, tolerancePpm, note, withdrawnAt } = row;
  return {
    id,
    version,
    productId: product.publicId,
    name,
    kind,
    frequencyHz,
    tolerancePpm,
    spread: spreadOf(row),
    note,
    by: { id: user.publicId, name: user.name },
    at: row.createdAt.toISOString(),
    withdrawn: withdrawnAt && {
      at: withdrawnAt.toISOString(),
      by: { id: withdrawer!.publicId, name: withdrawer!.name },
      reason: row.withdrawReason!,
    },
  };
}

function spreadOf({ spreadKind, spreadPct }: ProductClock): ClockView['spread'] {
  return spreadKind && spreadPct !== null ? { kind: spreadKind, pct: spreadPct } : null;
}

function said(row: ProductClock) {
  const { name, kind, frequencyHz, tolerancePpm, note } = row;
  return { name, kind, frequencyHz, tolerancePpm, spread: spreadOf(row), note };
}

/** As the row holds it. */
function written({ spread, ...rest }: z.infer<typeof changeClockBody>) {
  return { ...rest, ...(spread !== undefined && { spreadKind: spread?.kind ?? null, spreadPct: spread?.pct ?? null }) };
}

/** A declared clock of a product the actor may see, or NotFound. */
async function findClock(actor: Actor, publicId: string): Promise<Whole> {
  const row = (await ProductClock.findOne({ where: { publicId }, include: WHOLE })) as Whole | null;
  const own = visibleOrganisation(actor);
  if (!row || (own !== null && row.product.organisationId !== own)) throw new NotFound('declared clock');
  return row;
}

/** What a product is declared to run at now, in ascending frequency. Only in a unit of work. */
export async function declaredClocks(productId: number): Promise<ProductClock[]> {
  const where = { productId, withdrawnAt: null };
  return ProductClock.findAll({ where, order: [['frequencyHz', 'ASC']], limit: MOST_CLOCKS });
}

export async function listProductClocks(
  actor: Actor | null,
  productId: string,
  page: PageRequest,
): Promise<Page<ClockView>> {
  authorise(actor, 'clock.list');
  return unitOfWork(async () => {
    const product = await findProduct(actor, productId);
    const rows = await ProductClock.findAll({
      where: { productId: product.id, ...olderThan(page) },
      include: WHOLE,
      order: [['id', 'DESC']],
      limit: page.limit + 1,
    });
    return pageFrom(rows, page, view);
  });
}

export async function readProductClock(actor: Actor | null, publicId: string): Promise<ClockView> {
  authorise(actor, 'clock.list');
  return unitOfWork(async () => view(await findClock(actor, publicId)));
}

/** The lab's people and the product's own designers declare; both know their part of it. */
export async function addProductClock(
  actor: Actor | null,
  productId: string,
  body: z.infer<typeof addClockBody>,
  at = new Date(),
): Promise<ClockView> {
  authorise(actor, 'clock.write');
  return unitOfWork(async () => {
    const product = await findProduct(actor, productId);
    // Two at once are counted one after the other.
    await Product.findByPk(product.id, { lock: currentTransaction().LOCK.UPDATE });
    if ((await ProductClock.count({ where: { productId: product.id, withdrawnAt: null } })) >= MOST_CLOCKS) {
      throw new Conflict(
        `${product.code} has ${MOST_CLOCKS} declared clocks. Withdraw one before you declare another.`,
      );
    }
    const { spread, ...rest } = body;
    const row = await ProductClock.create({
      ...rest,
      publicId: newPublicId(),
      productId: product.id,
      spreadKind: spread?.kind ?? null,
      spreadPct: spread?.pct ?? null,
      userId: actor.userId,
      createdAt: at,
    });
    record(actor, product, 'clock declared', null, { clock: row.publicId, ...said(row) }, at);
    return view(await row.reload({ include: WHOLE }));
  });
}

export async function changeProductClock(
  actor: Actor | null,
  publicId: string,
  version: number,
  body: z.infer<typeof changeClockBody>,
): Promise<ClockView> {
  authorise(actor, 'clock.write');
  return unitOfWork(async () => {
    const row = await openClock(actor, publicId);
    const before = { clock: publicId, ...said(row) };
    await changeVersioned(ProductClock, row, version, written(body), 'declared clock');
    await row.reload({ include: WHOLE });
    record(actor, row.product, 'declared clock corrected', before, { clock: publicId, ...said(row) });
    return view(row);
  });
}

export async function withdrawProductClock(
  actor: Actor | null,
  publicId: string,
  version: number,
  { reason }: { reason: string },
  at = new Date(),
): Promise<ClockView> {
  authorise(actor, 'clock.write');
  return unitOfWork(async () => {
    const row = await openClock(actor, publicId);
    const values = { withdrawnAt: at, withdrawReason: reason, withdrawnBy: actor.userId };
    await changeVersioned(ProductClock, row, version, values, 'declared clock');
    const before = { clock: publicId, ...said(row) };
    record(actor, row.product, 'declared clock withdrawn', before, { clock: publicId, reason }, at);
    return view(await row.reload({ include: WHOLE }));
  });
}

async function openClock(actor: Actor, publicId: string): Promise<Whole> {
  const row = await findClock(actor, publicId);
  if (row.withdrawnAt) throw new Conflict(`${row.name} is withdrawn. Declare it again if the product runs at it.`);
  return row;
}

function record(
  actor: Actor,
  { publicId }: Product,
  action: string,
  before: Record<string, unknown> | null,
  after: Record<string, unknown>,
  at?: Date,
): void {
  recordChange(actor, { scope: 'lab', action, subjectType: 'product', subjectId: publicId, before, after, at });
}
