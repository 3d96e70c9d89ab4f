export interface MailContent {
  title: string;
  paragraphs: string[];
  /** Rows of "label: value", such as both local times. */
  facts?: [label: string, value: string][];
  /** What somebody wrote, set apart from what we say. */
  quote?: { by: string; words: string };
  button?: { label: string; url: string };
  /** Further addresses, one a line, under the button. */
  links?: { label: string; url: string }[];
  /** Paragraphs under all that, such as cautions. */
  closing?: string[];
  /** Small print, such as why this mail came. */
  footer: string;
  /** Where mails of this kind are switched off. */
  unsubscribe?: { label: string; url: string };
}

const FONT = "font-family:'Source Sans 3','Segoe UI',Helvetica,Arial,sans-serif";

/** One layout for every mail: plain text and HTML that say the same. Everything given is escaped. */
export function renderMail(content: MailContent): { html: string; text: string } {
  return { html: html(content), text: text(content) };
}

function text(content: MailContent): string {
  const { title, paragraphs, facts = [], quote, button, links = [] } = content;
  const { closing = [], footer, unsubscribe } = content;
  const width = Math.max(0, ...facts.map(([label]) => label.length));
  const rows = facts.map(([label, value]) => `${`${label}:`.padEnd(width + 2)}${value}`);
  const blocks = [
    title,
    ...paragraphs,
    ...(rows.length > 0 ? [rows.join('\n')] : []),
    ...(quote ? [`${quote.by}:\n${quote.words.replace(/^/gm, '> ')}`] : []),
    ...(button ? [`${button.label}:\n${button.url}`] : []),
    ...links.map(({ label, url }) => `${label}:\n${url}`),
    ...closing,
    `-- \n${footer}${unsubscribe ? `\n${unsubscribe.label}: ${unsubscribe.url}` : ''}`,
  ];
  return `${blocks.join('\n\n')}\n`;
}

function html(content: MailContent): string {
  const { title, paragraphs, facts = [], quote, button, links = [] } = content;
  const { closing = [], footer, unsubscribe } = content;
  const row = ([label, value]: [string, string]): string =>
    `<tr><td class="quiet" style="${FONT};font-size:15px;line-height:22px;color:#44535a;padding:2px 16px 2px 0;vertical-align:top">${escape(label)}</td>` +
    `<td class="ink" style="${FONT};font-size:15px;line-height:22px;color:#15222a;padding:2px 0;vertical-align:top">${escape(value)}</td></tr>`;
  const paragraphHtml = (paragraph: string): string =>
    `<p class="ink" style="${FONT};font-size:16px;line-height:24px;color:#15222a;margin:0 0 14px">${escape(paragraph)}</p>`;
  const parts = [
    `<h1 class="ink" style="${FONT};font-size:21px;line-height:28px;font-weight:600;color:#15222a;margin:0 0 14px">${escape(title)}</h1>`,
    ...paragraphs.map(paragraphHtml),
    facts.length > 0
      ? `<table role="presentation" cellpadding="0" cellspacing="0" border="0" style="margin:0 0 18px">${facts.map(row).join('')}</table>`
      : '',
    quote
      ? `<p class="quiet" style="${FONT};font-size:15px;line-height:22px;color:#44535a;margin:0 0 4px">${escape(quote.by)}</p>` +
        `<blockquote class="ink rule" style="${FONT};font-size:16px;line-height:24px;color:#15222a;border-left:3px solid #cdd4d0;margin:0 0 18px;padding:2px 0 2px 14px">${escape(quote.words).replaceAll('\n', '<br>')}</blockquote>`
      : '',
    button
      ? `<p style="margin:0 0 10px"><a class="button" href="${escape(button.url)}" style="${FONT};display:inline-block;font-size:16px;line-height:24px;font-weight:600;color:#f6f9f9;background-color:#14566b;padding:9px 18px;border-radius:2px;text-decoration:none">${escape(button.label)}</a></p>` +
        `<p class="quiet" style="${FONT};font-size:13px;line-height:19px;color:#44535a;margin:0 0 18px;word-break:break-all">${escape(button.url)}</p>`
      : '',
    ...links.map(
      ({ label, url }) =>
        `<p style="margin:0 0 10px"><a class="link" href="${escape(url)}" style="${FONT};font-size:16px;line-height:24px;color:#14566b">${escape(label)}</a></p>`,
    ),
    ...closing.map(paragraphHtml),
    `<p class="quiet rule" style="${FONT};font-size:13px;line-height:19px;color:#44535a;border-top:1px solid #cdd4d0;padding-top:12px;margin:6px 0 0">${escape(footer)}${unsubscribe ? ` <a class="quiet" href="${escape(unsubscribe.url)}" style="color:#44535a">${escape(unsubscribe.label)}</a>` : ''}</p>`,
  ];
  return `<!doctype html>
<html lang="en-GB">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width,initial-scale=1">
<meta name="color-scheme" content="light dark">
<meta name="supported-color-schemes" content="light dark">
<title>${escape(title)}</title>
<style>
:root { color-scheme: light dark; }
@media (prefers-color-scheme: dark) {
  .paper { background-color: #16140f !important; }
  .sheet { background-color: #1e1b16 !important; border-color: #35302a !important; }
  .ink { color: #d0c7b7 !important; }
  .quiet { color: #a89f91 !important; }
  .rule { border-color: #35302a !important; }
  .button { color: #10191a !important; background-color: #8bb9be !important; }
  .link { color: #8bb9be !important; }
}
</style>
</head>
<body class="paper" style="margin:0;padding:0;background-color:#f4f6f4">
<table role="presentation" class="paper" width="100%" cellpadding="0" cellspacing="0" border="0" style="background-color:#f4f6f4">
<tr><td align="center" style="padding:24px 12px">
<table role="presentation" class="sheet" width="100%" cellpadding="0" cellspacing="0" border="0" style="max-width:560px;background-color:#fbfcfb;border:1px solid #cdd4d0;border-radius:2px">
<tr><td align="left" style="padding:24px">
${parts.filter(Boolean).join('\n')}
</td></tr>
</table>
</td></tr>
</table>
</body>
</html>
`;
}

function escape(value: string): string {
  return value
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');
}
