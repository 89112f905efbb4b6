import { PageTitle } from '@/components/layout/page-title';
import { Section, TwoColumns } from '@/components/layout/section';
import { DecisionForm } from '@/components/review/decision-form';
import { offeredDecisions } from '@/components/review/offered-decisions';
import { NextSteps } from '@/components/review/next-steps';
import { packetLede, packetQuestion } from '@/components/review/packet-words';
import { StaticTable } from '@/components/tables/static-table';
import { TraceTable } from '@/components/trace/trace-table';
import { Notice } from '@/components/ui/notice';
import { OutcomeMark } from '@/components/ui/outcome-mark';
import { doseText } from '@/lib/design/dose-text';
import { printContext } from '@/lib/design/trace/format';
import { formatTime } from '@/components/ui/format-time';
import type { PacketView, ReviewedSubject, ReviewView } from '@/lib/queries/trial/review';
import { unitText } from '@/lib/schemas/units';
import { signRecommendation } from './actions';

function SubjectTable({ packet }: { packet: PacketView }) {
  const { present, absent } = packet.design.response;
  const words = { present, absent, 'not-evaluable': 'not evaluable', pending: 'pending' } as const;
  const row = (subject: ReviewedSubject) => ({
    id: subject.code,
    values: {
      code: subject.code,
      site: subject.site,
      given: subject.doseGiven,
      outcome: subject.outcome ? words[subject.outcome] : '',
      onset: subject.onsetDay,
      window: subject.windowEndsAt ? formatTime(subject.windowEndsAt, subject.timeZone, 'day') : '',
      deviation: subject.deviationReason ?? 'none',
    },
    content: {
      outcome: (
        <OutcomeMark outcome={subject.outcome ?? 'pending'} word={words[subject.outcome ?? 'pending']} />
      ),
    },
  });
  return (
    <StaticTable
      caption="Subjects of the cohort under review"
      stacked
      columns={[
        { key: 'code', header: 'Subject', kind: 'code', rowHeader: true },
        { key: 'site', header: 'Site' },
        { key: 'given', header: 'Dose given', unit: unitText(packet.design.unit), kind: 'number' },
        { key: 'outcome', header: 'Outcome' },
        { key: 'onset', header: 'Onset, day', kind: 'number' },
        { key: 'window', header: 'Window ended' },
        { key: 'deviation', header: 'Deviation' },
      ]}
      rows={packet.subjects.map(row)}
    />
  );
}

/** The packet on one page: the question, the cohort, the way to the dose, what would follow, and the decision. */
export function Packet({
  packet,
  trial,
  printedName,
}: {
  packet: PacketView;
  trial: ReviewView;
  printedName: string;
}) {
  const { design, number, dose, outcome } = packet;
  const last = packet.history.at(-1);
  const responses = last?.subjects.filter((subject) => subject.response).length ?? 0;
  const isStop = outcome === 'stop' || dose === null;
  const reached = isStop ? 'How the stop was reached' : `How ${doseText(design, dose)} was reached`;
  const { decisions, lowerDoses } = offeredDecisions(packet, trial.quorum);
  return (
    <>
      <PageTitle lede={packetLede(packet, { responses, evaluable: last?.subjects.length ?? 0 })}>
        {packetQuestion(packet)}
      </PageTitle>
      {packet.revision > 1 ? (
        <Notice kind="waiting" title={`Revision ${packet.revision}`} live={false}>
          The packet was computed anew since its first version. Signatures started at zero.
        </Notice>
      ) : null}
      {packet.subjects.length > 0 && packet.currentDose !== null ? (
        <Section title={`Cohort ${number - 1} at ${doseText(design, packet.currentDose)}`}>
          <SubjectTable packet={packet} />
        </Section>
      ) : null}
      <TwoColumns>
        <Section title={reached}>
          <TraceTable lines={packet.lines} context={printContext(design)} caption={reached} />
        </Section>
        {isStop ? null : (
          <Section title={`What would follow from ${doseText(design, dose)}`}>
            <NextSteps design={design} history={packet.history} dose={dose} number={number} />
          </Section>
        )}
      </TwoColumns>
      <Section title="Your decision" raised id="decision">
        {packet.sign === null ? (
          <p>
            Safety reviewers of the trial decide; {trial.quorum} signatures on the same decision are needed.
          </p>
        ) : packet.sign.why ? (
          <Notice kind="note" title="You may not sign this packet" live={false}>
            {packet.sign.why}
          </Notice>
        ) : (
          <div className="grid gap-4">
            {packet.own ? (
              <Notice kind="saved" title="You have signed" live={false}>
                “{packet.own.meaning}” A new signature of yours replaces it.
              </Notice>
            ) : null}
            <DecisionForm
              key={packet.recommendationId}
              packet={{
                trialCode: trial.trialCode,
                recommendationId: packet.recommendationId,
                seenDigest: packet.digest,
                recommended: packet.dose,
              }}
              decisions={decisions}
              lowerDoses={lowerDoses}
              printedName={printedName}
              action={signRecommendation}
            />
          </div>
        )}
      </Section>
    </>
  );
}
