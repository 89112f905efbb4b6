import { cautionAsText } from '@/components/caution/caution-texts';
import type { Block, MailContext, Message } from '../message';
import { footerSentences } from './footer';
import { LINE_LENGTH, wrap } from './wrap';

function blockAsText(block: Block, { url }: MailContext): string {
  switch (block.type) {
    case 'paragraph':
      return wrap(block.text);
    case 'dose':
      return `${block.label}:\n\n${wrap(block.dose.replaceAll(' ', '\u00a0'), '    ')}`;
    case 'facts': {
      const width = Math.max(...block.facts.map(({ label }) => label.length)) + 3;
      return block.facts.map(({ label, value }) => wrap(value, label.padEnd(width))).join('\n');
    }
    case 'action':
      return `${block.label}:\n${url}${block.path}`;
    case 'caution':
      return wrap(`CAUTION. ${cautionAsText('mail')}`, '| ', '| ');
  }
}

function heading({ title, tone }: Message): string {
  const lines = wrap(tone === 'halt' ? title.toUpperCase() : title);
  const width = Math.max(...lines.split('\n').map((line) => [...line].length));
  return `${lines}\n${'='.repeat(Math.min(width, LINE_LENGTH))}`;
}

/** A message as a plain text mail: lines of at most 72 characters, addresses whole, the foot set off by "-- ". */
export function asText(message: Message, context: MailContext): string {
  const { reader, record, sender } = footerSentences(message, context);
  const foot = [
    '-- ',
    wrap(reader),
    ...(record ? ['', record.label, record.head] : []),
    '',
    wrap(sender),
  ].join('\n');
  const body = message.blocks.map((block) => blockAsText(block, context));
  return `${[heading(message), ...body, foot].join('\n\n')}\n`;
}
