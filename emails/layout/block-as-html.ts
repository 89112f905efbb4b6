import { cautionTexts } from '@/components/caution/caution-texts';
import type { Block, MailContext } from '../message';
import { PALETTE, TYPEFACES } from '../palette';
import { type Html, html } from './html';
import { painted } from './paint';

const TEXT = `font-family:${TYPEFACES.sans};font-size:15px;line-height:1.55;`;
export const SMALL = `font-family:${TYPEFACES.sans};font-size:13px;line-height:1.5;`;
export const MONO = `font-family:${TYPEFACES.mono};font-size:12px;line-height:1.5;word-break:break-all;`;
export const SERIF = `font-family:${TYPEFACES.serif};font-weight:normal;`;

/** A table that lays out. */
export const table = (attributes: Html, rows: Html): Html =>
  html`<table role="presentation" width="100%" cellpadding="0" cellspacing="0" border="0" ${attributes}>
    ${rows}
  </table>`;

function dose(label: string, text: string): Html {
  const cell = painted(
    { bg: 'stone', b: 'water' },
    'padding:16px 20px 18px;border-left-width:4px;border-left-style:solid;',
  );
  const number = `${SERIF}margin:0;font-size:38px;line-height:1.2;font-variant-numeric:tabular-nums;word-break:break-word;`;
  return table(
    html``,
    html`<tr>
      <td ${cell}>
        <p ${painted({ c: 'ink-soft' }, `${SMALL}margin:0;`)}>${label}</p>
        <p ${painted({ c: 'ink' }, number)}>${text}</p>
      </td>
    </tr>`,
  );
}

function facts(block: Extract<Block, { type: 'facts' }>): Html {
  const cell =
    'padding:7px 0;border-top-width:1px;border-top-style:solid;vertical-align:top;text-align:left;';
  return html`<table
    width="100%"
    cellpadding="0"
    cellspacing="0"
    border="0"
    style="border-collapse:collapse;"
  >
    ${block.facts.map(
      ({ label, value }) =>
        html`<tr>
          <th
            scope="row"
            width="34%"
            ${painted({ c: 'ink-soft', b: 'line' }, `${TEXT}${cell}font-weight:normal;padding-right:14px;`)}
          >
            ${label}
          </th>
          <td ${painted({ c: 'ink', b: 'line' }, `${TEXT}${cell}word-break:break-word;`)}>${value}</td>
        </tr>`,
    )}
  </table>`;
}

function action(label: string, address: string): Html {
  const link = `${TEXT}display:inline-block;padding:11px 20px;font-weight:bold;text-decoration:none;`;
  return html`<table role="presentation" cellpadding="0" cellspacing="0" border="0">
      <tr>
        <td bgcolor="${PALETTE.water.light}" ${painted({ bg: 'water' })}>
          <a href="${address}" target="_blank" ${painted({ c: 'paper' }, link)}>${label}</a>
        </td>
      </tr>
    </table>
    <p ${painted({ c: 'ink-soft' }, `${SMALL}margin:8px 0 0;`)}>
      Or open this address:<br /><a href="${address}" target="_blank" ${painted({ c: 'water' }, MONO)}
        >${address}</a
      >
    </p>`;
}

function caution(): Html {
  const { title, sentences } = cautionTexts.mail;
  const cell = painted(
    { bg: 'ochre-wash', b: 'ochre' },
    'padding:12px 16px;border-left-width:4px;border-left-style:solid;',
  );
  return table(
    html``,
    html`<tr>
      <td ${cell}>
        <p ${painted({ c: 'ochre' }, `${TEXT}margin:0;font-weight:bold;`)}>Caution. ${title}</p>
        ${sentences.map(
          (sentence) => html` <p ${painted({ c: 'ink' }, `${TEXT}margin:6px 0 0;`)}>${sentence}</p>`,
        )}
      </td>
    </tr>`,
  );
}

/** One block of a message as HTML. */
export function blockAsHtml(block: Block, { url }: MailContext): Html {
  switch (block.type) {
    case 'paragraph':
      return html`<p ${painted({ c: 'ink' }, `${TEXT}margin:0;`)}>${block.text}</p>`;
    case 'dose':
      return dose(block.label, block.dose);
    case 'facts':
      return facts(block);
    case 'action':
      return action(block.label, url + block.path);
    case 'caution':
      return caution();
  }
}
