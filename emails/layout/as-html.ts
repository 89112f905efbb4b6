import type { MailContext, Message } from '../message';
import { blockAsHtml, MONO, SERIF, SMALL, table } from './block-as-html';
import { footerSentences } from './footer';
import { type Html, html } from './html';
import { darkStyles, painted } from './paint';

/** A row of the sheet: one cell with room above. */
const row = (content: Html): Html =>
  html`<tr>
    <td style="padding:18px 0 0;">${content}</td>
  </tr>`;

function footer(message: Message, context: MailContext): Html {
  const { reader, record, sender } = footerSentences(message, context);
  const line = painted({ c: 'ink-soft' }, `${SMALL}margin:0 0 8px;`);
  const head = painted({ c: 'ink-soft' }, MONO);
  return html`<p ${line}>${reader}</p>
    ${record ? html`<p ${line}>${record.label}<br /><span ${head}>${record.head}</span></p>` : html``}
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
  const rule = painted(
    { b: 'line' },
    'padding:16px 28px 14px;border-top-width:1px;border-top-style:solid;',
    'side',
  );
  return html`<!doctype html>
    <html lang="en">
      <head>
        <meta charset="utf-8" />
        <meta name="viewport" content="width=device-width, initial-scale=1" />
        <meta name="color-scheme" content="light dark" />
        <meta name="supported-color-schemes" content="light dark" />
        <title>${message.subject}</title>
        <style>
          :root{color-scheme:light dark} @media (max-width:480px){.side{padding-left:18px !important;padding-right:18px !important}} ${darkStyles()}
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
                    <td class="side" style="padding:22px 28px 0;">
                      <p ${painted({ c: 'water' }, `${SERIF}margin:0;font-size:17px;`)}>Stepwell</p>
                    </td>
                  </tr>
                  <tr>
                    <td class="side" style="padding:0 28px 26px;">
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
