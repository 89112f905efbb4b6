import { cautionTexts } from '@/components/caution/caution-texts';
import type { Block, MailContext, Message } from '../message';
import { PALETTE, TYPEFACES } from '../palette';
import { footerSentences } from './footer';
import { type Html, html } from './html';
import { darkStyles, painted } from './paint';

const TEXT = `font-family:${TYPEFACES.sans};font-size:15px;line-height:1.55;`;
const SMALL = `font-family:${TYPEFACES.sans};font-size:13px;line-height:1.5;`;
const MONO = `font-family:${TYPEFACES.mono};font-size:12px;line-height:1.5;word-break:break-all;`;
const SERIF = `font-family:${TYPEFACES.serif};font-weight:normal;`;

const table = (attributes: Html, rows: Html): Html =>
  html`<table role="presentation" width="100%" cellpadding="0" cellspacing="0" border="0" ${attributes}>
    ${rows}
  </table>`;

/** A row of the sheet: one cell with room above. */
const row = (content: Html): Html =>
  html`<tr>
    <td style="padding:18px 0 0;">${content}</td>
  </tr>`;

function dose(label: string, text: string): Html {
  const cell = painted(
    { bg: 'stone', b: 'water' },
    'padding:16px 20px 18px;border-left-width:4px;border-left-style:solid;',
  );
  const number = `${SERIF}margin:0;font-size:38px;line-height:1.2;font-variant-numeric:tabular-nums;white-space:nowrap;`;
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
      Or open this address:
      <a href="${address}" target="_blank" ${painted({ c: 'water' }, MONO)}>${address}</a>
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

function blockAsHtml(block: Block, { url }: MailContext): Html {
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

function footer(message: Message, context: MailContext): Html {
  const { reader, record, sender } = footerSentences(message, context);
  const line = painted({ c: 'ink-soft' }, `${SMALL}margin:0 0 8px;`);
  const head = painted({ c: 'ink-soft' }, MONO);
  return html`<p ${line}>${reader}</p>
    ${record ? html`<p ${line}>${record.label} <span ${head}>${record.head}</span></p>` : html``}
    <p ${line}>${sender}</p>`;
}

function heading({ title, tone }: Message): Html {
  const isHalt = tone === 'halt';
  const frame = isHalt
    ? painted(
        { bg: 'brick-wash', b: 'brick' },
        'padding:14px 20px;border-left-width:4px;border-left-style:solid;',
      )
    : html`style="padding:0;"`;
  const text = `${SERIF}margin:0;font-size:25px;line-height:1.25;`;
  return table(
    html``,
    html`<tr>
      <td ${frame}><h1 ${painted({ c: isHalt ? 'brick' : 'ink' }, text)}>${title}</h1></td>
    </tr>`,
  );
}

/**
 * A message as HTML mail: tables and styles in the elements, at most 600 px wide, no image, nothing fetched, nothing
 * that reports back; dark where the reader's device is.
 */
export function asHtml(message: Message, context: MailContext): string {
  const hidden =
    'display:none;max-height:0;max-width:0;overflow:hidden;opacity:0;font-size:1px;line-height:1px;';
  const sheet = painted(
    { bg: 'paper', b: 'line' },
    'max-width:600px;border-width:1px;border-style:solid;border-collapse:separate;',
  );
  const rule = painted({ b: 'line' }, 'padding:16px 28px 14px;border-top-width:1px;border-top-style:solid;');
  return html`<!doctype html>
    <html lang="en">
      <head>
        <meta charset="utf-8" />
        <meta name="viewport" content="width=device-width, initial-scale=1" />
        <meta name="color-scheme" content="light dark" />
        <meta name="supported-color-schemes" content="light dark" />
        <title>${message.subject}</title>
        <style>
          :root{color-scheme:light dark}${darkStyles()}
        </style>
      </head>
      <body ${painted({ bg: 'stone' }, 'margin:0;padding:0;-webkit-text-size-adjust:100%;')}>
        <div style="${hidden}">${message.preheader}</div>
        ${table(
          painted({ bg: 'stone' }),
          html`<tr>
            <td align="center" style="padding:24px 10px;">
              ${table(
                sheet,
                html`<tr>
                    <td style="padding:22px 28px 0;">
                      <p ${painted({ c: 'water' }, `${SERIF}margin:0;font-size:17px;`)}>Stepwell</p>
                    </td>
                  </tr>
                  <tr>
                    <td style="padding:0 28px 26px;">
                      ${table(html``, html`${row(heading(message))}${message.blocks.map((block) => row(blockAsHtml(block, context)))}`)}
                    </td>
                  </tr>
                  <tr>
                    <td ${rule}>${footer(message, context)}</td>
                  </tr>`,
              )}
            </td>
          </tr>`,
        )}
      </body>
    </html> `.source;
}
