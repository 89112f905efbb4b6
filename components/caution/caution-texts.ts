/** Where a caution stands. */
export type CautionPlace = 'page' | 'letter' | 'mail' | 'export';

/** A caution: a title and sentences, plain text. */
export interface CautionText {
  title: string;
  sentences: readonly string[];
}

/**
 * The caution, one text per place and the same in substance: a calculated suggestion; the protocol, the ethics
 * board and the safety committee decide; local rules and licensed judgement; the site's own emergency procedure.
 */
export const cautionTexts: Record<CautionPlace, CautionText> = {
  page: {
    title: 'A calculated suggestion.',
    sentences: [
      'The approved protocol, the ethics board and the safety committee decide. Follow local rules and licensed judgement.',
      'In an emergency use the site’s own emergency procedure, not this page.',
    ],
  },
  letter: {
    title: 'The dose in this letter rests on a calculated suggestion that reviewers signed.',
    sentences: [
      'The approved protocol, the ethics board and the safety committee decide. Follow local rules and licensed judgement for every subject.',
      'In an emergency use the site’s own emergency procedure, not this letter.',
    ],
  },
  mail: {
    title: 'A calculated suggestion.',
    sentences: [
      'The approved protocol, the ethics board and the safety committee decide. Follow local rules and licensed judgement.',
      'In an emergency use the site’s own emergency procedure, not this message. What counts is the record in Stepwell, not this copy.',
    ],
  },
  export: {
    title: 'Calculated suggestions.',
    sentences: [
      'The doses in this file are or rest on calculated suggestions. The approved protocol, the ethics board and the safety committee decide; follow local rules and licensed judgement.',
      'In an emergency use the site’s own emergency procedure, not this file. It shows the record at the time it was made.',
    ],
  },
};

/** A caution as one paragraph of plain text, for text mails, exports and printed letters. */
export function cautionAsText(place: CautionPlace): string {
  const { title, sentences } = cautionTexts[place];
  return [title, ...sentences].join(' ');
}
