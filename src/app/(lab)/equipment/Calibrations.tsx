import { EmptyLine } from '@/components/ui/EmptyLine';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { formatDay } from '@/format/dates';
import { ABSENT } from '@/format/quantities';
import type { EquipmentRecord } from '@/schemas/bench';
import { stripScale } from './calibrationScale';
import { CalibrationStrip, StripHead } from './CalibrationStrip';

/** The strip of an item, and every calibration it has had, the newest first. */
export function Calibrations({ item, today }: { item: EquipmentRecord; today: string }) {
  const scale = stripScale(today);
  return (
    <section aria-label="Calibrations">
      <SectionHeading className="mt-4" remark={item.calibrations.length > 1 && 'newest first'}>
        Calibrations
      </SectionHeading>
      {item.calibratedOn && (
        <div className="mt-2 mr-8 max-w-[560px]">
          <StripHead scale={scale} />
          <CalibrationStrip item={item} scale={scale} />
        </div>
      )}
      {item.calibrations.length === 0 ? (
        <EmptyLine lead="No calibration is entered yet.">
          It comes with a factor table, or with the bench file.
        </EmptyLine>
      ) : (
        <Table caption="Calibrations, newest first" className="max-pad:[&_td]:align-top">
          <TableHead>
            <HeadCell>Certificate</HeadCell>
            <HeadCell className="max-pad:hidden">By</HeadCell>
            <HeadCell figure>Calibrated</HeadCell>
            <HeadCell figure>Due</HeadCell>
          </TableHead>
          <tbody>
            {item.calibrations.map((one) => (
              <Row key={one.id}>
                <KeyCell className="[overflow-wrap:anywhere]">
                  {one.certificate}
                  <span className="t-detail block font-normal pad:hidden">{one.laboratory}</span>
                </KeyCell>
                <Cell quiet className="max-pad:hidden">
                  {one.laboratory}
                </Cell>
                <Cell figure>{formatDay(one.calibratedOn)}</Cell>
                <Cell figure>{one.dueOn ? formatDay(one.dueOn) : ABSENT}</Cell>
              </Row>
            ))}
          </tbody>
        </Table>
      )}
    </section>
  );
}
