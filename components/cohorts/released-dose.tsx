import { TimeInZone } from '../ui/time-in-zone';

const listed = new Intl.ListFormat('en-GB', { type: 'conjunction' });

/**
 * The released dose of a cohort, and on whose signatures it rests. Large only while subjects may be dosed with it: an
 * old dose, or one of a halted trial, is not to be taken for one in force.
 * @param notForDosing why nobody may be dosed now; null while subjects may
 */
export function ReleasedDose({
  dose,
  zone,
  notForDosing,
}: {
  dose: {
    readonly text: string;
    readonly releasedAt: string;
    readonly signers: readonly string[];
    readonly designVersion: number;
    readonly recommendedText: string | null;
  };
  zone: string;
  notForDosing: string | null;
}) {
  const isInForce = notForDosing === null;
  return (
    <section
      aria-label="Released dose"
      className="mb-6 border border-line bg-stone px-4 py-3.5 md:px-5.5 md:py-4.5"
    >
      <p className="text-sm text-ink-soft">{isInForce ? 'Released dose' : 'Dose of this cohort'}</p>
      <p
        className={`font-serif font-medium whitespace-nowrap tabular ${
          isInForce ? 'text-[3.25rem] leading-tight' : 'text-xl'
        }`}
      >
        {dose.text.replaceAll(' ', '\u00a0')}
      </p>
      {notForDosing ? <p className="mt-1 font-semibold text-ochre">{notForDosing}</p> : null}
      <p className="mt-1.5 max-w-prose text-sm text-ink-soft">
        Dose released by signature of {listed.format(dose.signers)}, design version {dose.designVersion},{' '}
        <TimeInZone at={dose.releasedAt} zone={zone} />.
        {dose.recommendedText ? ` The recommended dose was ${dose.recommendedText}.` : ''}
      </p>
    </section>
  );
}
