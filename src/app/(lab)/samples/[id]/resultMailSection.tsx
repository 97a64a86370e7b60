import type { Actor } from '@/auth/actor';
import { mayRole } from '@/auth/permissions';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { StateTag } from '@/components/ui/StateTag';
import { Cell, HeadCell, KeyCell, Row, Table, TableHead } from '@/components/ui/Table';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { formatDayTime } from '@/format/dates';
import type { SampleView } from '@/schemas/job';
import type { ResultMailView } from '@/schemas/resultMail';
import { listResultMailRecipients, listResultMails } from '@/services/resultMails';
import { MAIL_POSITIONS, mailWords } from './mailWords';
import { SendResult } from './SendResult';

/** Older ones stand in the API's list. */
const SHOWN = 20;
const WIDE = 'max-pad:hidden';

/** What was sent of this sample's results, to whom and what became of it; a manager sends more. For the lab's people. */
export async function resultMailSection(actor: Actor, sample: SampleView, zone: string) {
  if (!mayRole(actor.role, 'result-mail.list')) return null;
  const { items, next } = await listResultMails(actor, { sampleId: sample.id, limit: SHOWN });
  const measured = [...sample.states].reverse().filter(({ runs }) => runs > 0);
  const sends = mayRole(actor.role, 'result-mail.send') && measured.length > 0;
  const recipients = sends
    ? (await listResultMailRecipients(actor, { stateId: measured[0]!.id, limit: 200 })).items
    : [];
  if (items.length === 0 && !sends) return null;
  return (
    <section aria-label="Result e-mail" id="result-mail">
      <SectionHeading className="mt-6" remark={`to designers of ${sample.organisation.name} only`}>
        Result e-mail
      </SectionHeading>
      {items.length > 0 ? (
        <Table caption="Result e-mails of this sample" className="max-pad:[&_td]:align-top max-pad:[&_th]:align-top">
          <TableHead>
            <HeadCell>To</HeadCell>
            <HeadCell>State</HeadCell>
            <HeadCell className={WIDE}>Asked for</HeadCell>
            <HeadCell className={WIDE}>By</HeadCell>
            <HeadCell>What became of it</HeadCell>
          </TableHead>
          <tbody>
            {items.map((mail) => (
              <MailRow key={mail.id} mail={mail} zone={zone} />
            ))}
          </tbody>
        </Table>
      ) : (
        <EmptyLine lead="No result was sent yet." />
      )}
      {next && <p className="t-detail mt-2">Only the newest {SHOWN} are shown.</p>}
      {sends && (
        <SendResult
          organisation={sample.organisation.name}
          states={measured.map(({ id, label, description }) => ({ id, label, description }))}
          recipients={recipients}
          sentBefore={items.length > 0}
        />
      )}
    </section>
  );
}

function MailRow({ mail, zone }: { mail: ResultMailView; zone: string }) {
  return (
    <Row>
      <KeyCell className="max-pad:py-2.5">
        {mail.to.name}
        <span className="t-detail block font-normal pad:hidden">{formatDayTime(mail.at, zone)}</span>
        <details className="font-normal">
          <summary className="text-pen max-pad:min-h-11 max-pad:py-2.5">The words as sent</summary>
          <pre className="t-detail mt-1 mb-2 max-w-[40rem] font-sans whitespace-pre-wrap">{mail.text}</pre>
        </details>
      </KeyCell>
      <Cell className="align-top py-1.5! max-pad:py-2.5!">
        <StateTag label={mail.state.label} />
      </Cell>
      <Cell quiet className={`${WIDE} align-top py-1.5! whitespace-nowrap`}>
        {formatDayTime(mail.at, zone)}
      </Cell>
      <Cell quiet className={`${WIDE} align-top py-1.5!`}>
        {mail.by.name}
      </Cell>
      <Cell className="align-top py-1.5! max-pad:py-2.5!">
        <VerdictWord verdict={MAIL_POSITIONS[mail.mail?.state ?? 'queued']} className="whitespace-normal!">
          {mailWords(mail.mail, zone)}
        </VerdictWord>
      </Cell>
    </Row>
  );
}
