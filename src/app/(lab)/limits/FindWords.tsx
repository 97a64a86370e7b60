import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';

/** Words to find a list's rows by; works without a script. */
export function FindWords({ action, value, label }: { action: string; value: string; label: string }) {
  return (
    <form action={action} role="search" className="mt-4 flex max-w-[36rem] flex-wrap items-end gap-2.5">
      <Field label={label} name="find" type="search" defaultValue={value} maxLength={120} className="min-w-0 flex-1" />
      <Button type="submit">Find</Button>
    </form>
  );
}
