import Link from 'next/link';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatDay } from '@/format/dates';
import { formatCount } from '@/format/quantities';
import type { EquipmentView } from '@/schemas/bench';
import { DUE_VERDICTS, dueWords, kindOf, quantityOf } from './equipmentWords';

/** Certificate, laboratory and dates of the last calibration. */
export function CalibrationRecord({ item, today }: { item: EquipmentView; today: string }) {
  return (
    <>
      <p>{item.description || kindOf(item.role)}</p>
      <p>
        <Link href={`/equipment/${item.id}`} className="text-pen underline">
          Open the sheet of {item.identifier}
        </Link>
      </p>
      <p>
        <VerdictWord verdict={DUE_VERDICTS[item.due]}>{dueWords(item, today)}</VerdictWord>
      </p>
      {item.calibratedOn && (
        <dl className="column-pair">
          <dt>Calibrated</dt>
          <dd>{formatDay(item.calibratedOn)}</dd>
          <dt>Due</dt>
          <dd>{item.dueOn ? formatDay(item.dueOn) : 'no due date'}</dd>
          <dt>Certificate</dt>
          <dd className="[overflow-wrap:anywhere]">{item.certificate ?? 'not recorded'}</dd>
          <dt>By</dt>
          <dd>{item.laboratory ?? 'not recorded'}</dd>
        </dl>
      )}
    </>
  );
}

/** Every revision of every table: runs name the one they were corrected with. */
export function FactorTables({ item }: { item: EquipmentView }) {
  if (item.tables.length === 0) return <p className="column-quiet">No factor table is kept for it.</p>;
  return (
    <ul>
      {item.tables.map((table) => (
        <li key={table.id}>
          <Link href={`/equipment/${item.id}?table=${table.id}#table`} className="text-pen">
            {table.name}
          </Link>
          <span className="column-quiet block">
            {quantityOf(table.quantity)}
            {table.polarisation ? `, ${table.polarisation}` : ''}, {formatCount(table.rows)} rows, revision{' '}
            {table.revision}
          </span>
          <span className="column-quiet block">{table.source}</span>
        </li>
      ))}
    </ul>
  );
}
