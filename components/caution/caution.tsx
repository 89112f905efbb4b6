import { cautionTexts, type CautionPlace } from './caution-texts';

/** The caution, wherever a recommendation is shown or printed. One component, one text per place. */
export function Caution({ place = 'page' }: { place?: CautionPlace }) {
  const { title, sentences } = cautionTexts[place];
  return (
    <div
      role="note"
      aria-label="Caution"
      className="border-l-4 border-ochre bg-ochre-wash px-3.5 py-3 text-sm print:border print:border-l-4"
    >
      <p className="font-semibold text-ochre">{title}</p>
      {sentences.map((sentence) => (
        <p key={sentence} className="mt-1.5">
          {sentence}
        </p>
      ))}
    </div>
  );
}
