import type { Metadata } from 'next';
import Link from 'next/link';
import { requireActor } from '@/app/requireActor';
import { asked, listed, type Search } from '@/app/(lab)/jobs/listed';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { ButtonLink } from '@/components/ui/Button';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { Pager } from '@/components/ui/Pager';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { formatCount } from '@/format/quantities';
import { capitalised, countInWords } from '@/format/words';
import type { ProductView } from '@/schemas/job';
import { listProducts } from '@/services/products';

export const metadata: Metadata = { title: 'Products' };

const WIDE = 'max-pad:hidden';

export default async function ProductsPage({ searchParams }: { searchParams: Search }) {
  const actor = await requireActor();
  const lab = actor.role !== 'designer';
  const after = await asked(searchParams, 'after');
  const { items, next } = await listed(listProducts(actor, { limit: 50, after }));
  return (
    <Sheet
      header={
        <SheetHeader
          title="Products"
          actions={
            lab && (
              <ButtonLink kind="primary" href="/jobs/new">
                Open a job
              </ButtonLink>
            )
          }
        />
      }
    >
      <p className="finding mt-2">{items.length > 0 && sentence(items, after === undefined && next === null, lab)}</p>
      <div className="mt-4">
        <Table caption="Products, newest first" className="max-pad:[&_td]:align-top max-pad:[&_th]:align-top">
          <TableHead>
            <HeadCell>Code</HeadCell>
            <HeadCell>Name</HeadCell>
            {lab && <HeadCell className={WIDE}>Client</HeadCell>}
            <HeadCell className={WIDE}>What it is</HeadCell>
          </TableHead>
          <tbody>
            {items.map((product) => (
              <Row key={product.id}>
                <KeyCell className="whitespace-nowrap max-pad:py-2">
                  <Link prefetch={false} href={`/products/${product.id}`}>
                    {product.code}
                  </Link>
                </KeyCell>
                <Cell className="max-pad:py-2 pad:whitespace-nowrap">
                  {product.name}
                  <span className="t-detail block pad:hidden">
                    {lab && `${product.organisation.name}. `}
                    {product.description}
                  </span>
                </Cell>
                {lab && (
                  <Cell className={`${WIDE} whitespace-nowrap`} quiet>
                    {product.organisation.name}
                  </Cell>
                )}
                <Cell className={WIDE} quiet>
                  {product.description}
                </Cell>
              </Row>
            ))}
          </tbody>
        </Table>
        {items.length === 0 && (
          <EmptyLine
            lead={lab ? 'Open a job and enter its product with it.' : 'The lab has entered no product of yours yet.'}
          >
            {lab
              ? 'A product belongs to one client and is seen by its people alone.'
              : 'It stands here as soon as a job is opened for it.'}
          </EmptyLine>
        )}
        <Pager firstHref={after ? '/products' : null} nextHref={next && `/products?after=${next}`}>
          {items.length > 0 &&
            `${formatCount(items.length)} ${items.length === 1 ? 'product' : 'products'}, newest first`}
        </Pager>
      </div>
    </Sheet>
  );
}

function sentence(items: readonly ProductView[], whole: boolean, lab: boolean): string {
  const products = `${countInWords(items.length)} ${items.length === 1 ? 'product' : 'products'}`;
  const clients = new Set(items.map(({ organisation }) => organisation.id)).size;
  const of = lab ? ` of ${countInWords(clients)} ${clients === 1 ? 'client' : 'clients'}` : '';
  return whole ? `${capitalised(products)}${of}.` : `These ${products}${of} are part of a longer list.`;
}
