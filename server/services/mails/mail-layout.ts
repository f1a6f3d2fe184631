import type { MailBody } from '../mail-templates.ts';

/** What a mail says, without markup: everything here is escaped. */
export interface MailContent {
  subject: string;
  farmName: string;
  heading: string;
  paragraphs: readonly string[];
  /** A small table of names and values. */
  rows?: readonly { label: string; value: string }[];
  act?: { label: string; url: string };
  /** Small print at the end. */
  note?: string;
}

const FONT = "font-family:Roboto,'Segoe UI',Helvetica,Arial,sans-serif";
const INK = '#16211E';
const INK_SOFT = '#4B5955';
const PLUM = '#7A2A50';
const RULE = '#D3DAD5';

/** One look for every mail of the farm, as HTML and as plain text. */
export function mailBody(content: MailContent): MailBody {
  return { subject: content.subject, html: htmlOf(content), text: textOf(content) };
}

function htmlOf({ subject, farmName, heading, paragraphs, rows = [], act, note }: MailContent): string {
  const parts = [
    `<h1 style="margin:0 0 16px;${FONT};font-size:22px;line-height:28px;font-weight:500;color:${INK}">${escaped(heading)}</h1>`,
    ...paragraphs.map((paragraph) => paragraphOf(paragraph, INK, 15)),
    rows.length > 0 ? tableOf(rows) : '',
    act ? buttonOf(act) : '',
    note ? paragraphOf(note, INK_SOFT, 13) : '',
  ];
  return `<!doctype html>
<html lang="en">
<head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><title>${escaped(subject)}</title></head>
<body style="margin:0;padding:24px 12px;background:#F3F5F3">
<table role="presentation" width="100%" cellspacing="0" cellpadding="0"><tr><td align="center">
<table role="presentation" width="100%" cellspacing="0" cellpadding="0" style="max-width:560px">
<tr><td style="padding:0 4px 12px;${FONT};font-size:14px;font-weight:700;color:${INK}">${escaped(farmName)}</td></tr>
<tr><td style="padding:28px;background:#FFFFFF;border:1px solid ${RULE};border-radius:6px">
${parts.filter((part) => part !== '').join('\n')}
</td></tr>
<tr><td style="padding:12px 4px;${FONT};font-size:13px;line-height:19px;color:${INK_SOFT}">Sent by Limestead for ${escaped(farmName)}.</td></tr>
</table>
</td></tr></table>
</body>
</html>
`;
}

function paragraphOf(text: string, colour: string, size: number): string {
  return `<p style="margin:0 0 14px;${FONT};font-size:${size}px;line-height:1.5;color:${colour}">${escaped(text)}</p>`;
}

function tableOf(rows: readonly { label: string; value: string }[]): string {
  const cell = `padding:7px 0;border-top:1px solid ${RULE};${FONT};font-size:14px;line-height:20px`;
  const lines = rows.map(
    ({ label, value }) =>
      `<tr><td style="${cell};color:${INK_SOFT}">${escaped(label)}</td><td align="right" style="${cell};color:${INK}">${unbroken(escaped(value))}</td></tr>`,
  );
  return `<table role="presentation" width="100%" cellspacing="0" cellpadding="0" style="margin:0 0 18px">${lines.join('')}</table>`;
}

/** Codes like 7Q2-KX9M are not broken at their dash. */
function unbroken(html: string): string {
  return html.replaceAll(/\b[0-9A-Z]{3}-[0-9A-Z]{4}\b/g, '<span style="white-space:nowrap">$&</span>');
}

function buttonOf({ label, url }: { label: string; url: string }): string {
  return `<p style="margin:20px 0 22px"><a href="${escaped(url)}" style="display:inline-block;padding:13px 22px;background:${PLUM};border-radius:6px;${FONT};font-size:15px;font-weight:500;color:#FFFFFF;text-decoration:none">${escaped(label)}</a></p>
<p style="margin:0 0 14px;${FONT};font-size:13px;line-height:19px;color:${INK_SOFT};word-break:break-all">Or open this address: ${escaped(url)}</p>`;
}

function textOf({ farmName, heading, paragraphs, rows = [], act, note }: MailContent): string {
  const blocks = [
    heading,
    ...paragraphs,
    rows.map(({ label, value }) => `${label}: ${value}`).join('\n'),
    act ? `${act.label}:\n${act.url}` : '',
    note ?? '',
    `Sent by Limestead for ${farmName}.`,
  ];
  return `${blocks.filter((block) => block !== '').join('\n\n')}\n`;
}

function escaped(text: string): string {
  return text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');
}
