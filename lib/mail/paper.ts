import { html, Markup } from './markup'

/** Mail programs read neither style sheets nor variables: the light colours of our tokens, written out. */
const ink = '#1f2723'
const paper = '#faf7f0'
const sheet = '#fffdf8'
const hair = '#e3dccb'
const muted = '#4c5751'
const brook = '#0f6b5c'
const letters = "'Atkinson Hyperlegible Next', Verdana, 'Segoe UI', sans-serif"
const headings = "'Bricolage Grotesque', Verdana, 'Segoe UI', sans-serif"

const bodyStyle = `margin:0; padding:0; background:${paper}; color:${ink}; font-family:${letters}; font-size:16px; line-height:1.55;`
const sheetStyle = `background:${sheet}; border:1px solid ${hair}; border-top:3px solid ${brook}; border-radius:12px; padding:32px;`
const buttonStyle = `display:inline-block; background:${brook}; color:#ffffff; text-decoration:none; font-weight:600; padding:11px 20px; border-radius:8px;`

type Sheet = {
  subject: string
  heading: string
  paragraphs: string[]
  action?: { label: string; href: string }
  afterword: string[]
  home: string
}

/** The HTML of a mail: one sheet on the paper ground, laid out with tables because mail programs know nothing newer. */
export function onPaper({ subject, heading, paragraphs, action, afterword, home }: Sheet): string {
  const page = html`<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="color-scheme" content="light only">
<title>${subject}</title>
</head>
<body style="${bodyStyle}">
<table role="presentation" width="100%" cellpadding="0" cellspacing="0" style="background:${paper};"><tr><td align="center" style="padding:28px 16px 40px;">
<table role="presentation" width="100%" cellpadding="0" cellspacing="0" style="max-width:560px; text-align:left;">
<tr><td style="padding:0 4px 14px; font-family:${headings}; font-size:18px; font-weight:600; color:${ink};">Tallybrook</td></tr>
<tr><td style="${sheetStyle}">
<h1 style="margin:0 0 18px; font-family:${headings}; font-size:23px; line-height:1.25; font-weight:600; color:${ink};">${heading}</h1>
${Markup.join(paragraphs.map(paragraph))}
${action ? button(action) : ''}
<div style="margin-top:26px; padding-top:16px; border-top:1px solid ${hair}; color:${muted}; font-size:14px;">
${Markup.join(afterword.map(small))}
</div>
</td></tr>
<tr><td style="padding:16px 4px 0; color:${muted}; font-size:13px;">Sent by Tallybrook at <a href="${home}" style="color:${muted};">${home}</a>. Answers to this address are not read.</td></tr>
</table>
</td></tr></table>
</body>
</html>
`
  return page.source
}

const paragraph = (text: string) => html`<p style="margin:0 0 14px;">${text}</p>`
const small = (text: string) => html`<p style="margin:0 0 8px;">${text}</p>`

/** The address stands under the button too: some programs show no buttons, and some people trust none. */
function button({ label, href }: { label: string; href: string }): Markup {
  return html`<p style="margin:22px 0 12px;"><a href="${href}" style="${buttonStyle}">${label}</a></p>
<p style="margin:0; color:${muted}; font-size:13px; word-break:break-all;">Or open <a href="${href}" style="color:${brook};">${href}</a></p>`
}
