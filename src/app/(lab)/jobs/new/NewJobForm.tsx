'use client';

import { useState, type FormEvent } from 'react';
import { useRouter } from 'next/navigation';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { useSubmit } from '@/components/forms/useSubmit';
import { Button, ButtonLink } from '@/components/ui/Button';
import { Field, SelectField } from '@/components/ui/Field';
import { Switch } from '@/components/ui/Switch';
import { RULE_CHOICES, RULE_SAYS } from '@/format/decisionRules';
import type { JobView, ProductView } from '@/schemas/job';

type DecisionRule = JobView['decisionRule'];
import { WRITES } from '../writes';
import { NewProductFields, type NewProduct } from './NewProductFields';
import { ProductField, type ProductPage } from './ProductField';

interface Props {
  products: ProductPage;
  clients: readonly { id: string; name: string }[];
  chosen: string | null;
}

const NONE: NewProduct = { organisationId: '', code: '', name: '', description: '' };

/** A job of a product that is known or is entered with it: the product first, then the job, each at most once. */
export function NewJobForm({ products, clients, chosen }: Props) {
  const router = useRouter();
  const job = useSubmit<{ productId: string; title: string; decisionRule: DecisionRule }, JobView>(WRITES.createJob);
  const enter = useSubmit<NewProduct, ProductView>(WRITES.createProduct);
  const [known, setKnown] = useState(products);
  const [from, setFrom] = useState<'known' | 'new'>(products.items.length > 0 ? 'known' : 'new');
  const [productId, setProductId] = useState(chosen ?? '');
  const [entered, setEntered] = useState(NONE);
  const [title, setTitle] = useState('');
  const [rule, setRule] = useState<DecisionRule>('guarded-by-u');
  const [missing, setMissing] = useState<{ product?: string; title?: string }>({});
  const [leaving, setLeaving] = useState(false);

  async function open(event: FormEvent) {
    event.preventDefault();
    const product = from === 'known' && !productId ? 'Choose the product the job is for.' : undefined;
    const untitled = title.trim() ? undefined : 'A job needs a title.';
    setMissing({ product, title: untitled });
    if (product ?? untitled) return;
    let id = productId;
    if (from === 'new') {
      const answer = await enter.submit(entered);
      if (!answer.ok) return;
      // From here on it is a known product, whatever becomes of the job.
      setKnown((before) => ({ ...before, items: [answer.reply, ...before.items] }));
      setProductId((id = answer.reply.id));
      setFrom('known');
      setEntered(NONE);
    }
    const answer = await job.submit({ productId: id, title, decisionRule: rule });
    if (!answer.ok) return;
    setLeaving(true);
    router.push(`/jobs/${answer.reply.id}`);
  }

  const wrong = [enter.problem, job.problem].find((problem) => problem && problem.errors.length === 0) ?? null;
  return (
    <form onSubmit={open} noValidate className="mt-4 grid max-w-[36rem] gap-4" aria-label="Open a job">
      <Switch
        legend="Product"
        shown
        value={from}
        onChange={setFrom}
        choices={[
          { value: 'known', word: 'Known product' },
          { value: 'new', word: 'New product' },
        ]}
      />
      {from === 'known' ? (
        <ProductField
          page={known}
          onPage={setKnown}
          value={productId}
          onChange={setProductId}
          error={missing.product ?? (job.fieldErrors.productId && `Product ${job.fieldErrors.productId}.`)}
        />
      ) : (
        <NewProductFields value={entered} onChange={setEntered} clients={clients} errors={enter.fieldErrors} />
      )}
      <Field
        label="Title of the job"
        name="title"
        autoComplete="off"
        value={title}
        onChange={(event) => setTitle(event.target.value)}
        hint="What is asked for, as in: LD-40, CISPR 32 class B, mains and radiated"
        error={missing.title ?? (job.fieldErrors.title && `Title ${job.fieldErrors.title}.`)}
      />
      <SelectField
        label="Decision rule"
        value={rule}
        onChange={(event) => setRule(event.target.value as DecisionRule)}
        hint={RULE_SAYS[rule]}
      >
        {RULE_CHOICES.map(({ value, word }) => (
          <option key={value} value={value}>
            {word}
          </option>
        ))}
      </SelectField>
      <ProblemMessage problem={wrong} />
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" type="submit" busy={enter.busy || job.busy || leaving}>
          {from === 'new' ? 'Enter the product and open the job' : 'Open the job'}
        </Button>
        <ButtonLink kind="quiet" href="/jobs">
          Leave it
        </ButtonLink>
      </div>
    </form>
  );
}
