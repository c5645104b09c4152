/** A mail ready to be stored: subject, and the same content as plain text and as HTML. */
export interface MailContent {
  subject: string
  text: string
  html: string
}

/** One piece of a mail, in the order in which it is read. */
export type MailBlock =
  | { kind: 'paragraph'; text: string }
  | { kind: 'facts'; rows: readonly (readonly [name: string, value: string])[] }
  | { kind: 'heading'; text: string }
  | { kind: 'list'; items: readonly string[] }
  /** Rows of label and sentence, grouped under a name (a motor and what it fails). */
  | { kind: 'groups'; groups: readonly { name: string; lines: readonly string[] }[] }
  | { kind: 'action'; text: string; link: string }

/** Makes any text safe inside HTML, attributes included. */
export function escapeHtml(text: string): string {
  return text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;').replaceAll('\'', '&#39;')
}

/** A text on one line without control characters, as a header needs it. */
export function oneLine(text: string): string {
  return text.replaceAll(/[\p{Cc}\u2028\u2029]+/gu, ' ').trim()
}

/**
 * A mail from its blocks.
 *
 * The HTML uses no images, no style sheet and no colours of its own, so that it reads the same where any of them is stripped and follows the reader's
 * light or dark theme.
 *
 * @param input.plantName who writes.
 * @param input.footer last lines, small.
 */
export function composeMail(input: { subject: string; plantName: string; blocks: readonly MailBlock[]; footer: string }): MailContent {
  const subject = oneLine(input.subject)
  return {
    subject,
    text: `${[...input.blocks.map(textOf), `-- \n${input.footer}`].join('\n\n')}\n`,
    html: `<!doctype html>
<html lang="en" style="color-scheme: light dark">
<head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1"><meta name="color-scheme" content="light dark"><title>${escapeHtml(subject)}</title></head>
<body style="margin:0;padding:16px;font-family:'Atkinson Hyperlegible Next',Verdana,sans-serif;font-size:16px;line-height:1.5">
<div style="max-width:640px">
<p style="margin:0 0 16px;font-weight:600">${escapeHtml(input.plantName)} · incoming inspection</p>
${input.blocks.map(htmlOf).join('\n')}
<p style="margin:32px 0 0;padding-top:12px;border-top:1px solid #8a8478;font-size:14px">${escapeHtml(input.footer).replaceAll('\n', '<br>')}</p>
</div>
</body>
</html>
`,
  }
}

function textOf(block: MailBlock): string {
  switch (block.kind) {
    case 'paragraph': return block.text
    case 'heading': return block.text.toUpperCase()
    case 'facts': return block.rows.map(([name, value]) => `${name}: ${value}`).join('\n')
    case 'list': return block.items.map(item => `* ${item}`).join('\n')
    case 'groups': return block.groups.map(group => [group.name, ...group.lines.map(line => `  ${line}`)].join('\n')).join('\n')
    case 'action': return `${block.text}:\n${block.link}`
  }
}

const MONO = 'font-family:\'Atkinson Hyperlegible Mono\',\'DejaVu Sans Mono\',monospace'
const CELL = 'padding:8px 12px 8px 0;border-top:1px solid #8a8478;text-align:left;vertical-align:top'

function htmlOf(block: MailBlock): string {
  switch (block.kind) {
    case 'paragraph': return `<p style="margin:0 0 16px">${escapeHtml(block.text).replaceAll('\n', '<br>')}</p>`
    case 'heading': return `<h2 style="margin:24px 0 8px;font-size:18px">${escapeHtml(block.text)}</h2>`
    case 'facts': return `<p style="margin:0 0 16px">${block.rows.map(([name, value]) => `${escapeHtml(name)}: <strong>${escapeHtml(value)}</strong>`).join('<br>')}</p>`
    case 'list': return `<ul style="margin:0 0 16px;padding-left:20px">${block.items.map(item => `<li>${escapeHtml(item)}</li>`).join('')}</ul>`
    case 'groups': return `<table style="border-collapse:collapse;width:100%;margin:0 0 16px">${block.groups.map(rowOf).join('')}</table>`
    case 'action': return `<p style="margin:24px 0"><a href="${escapeHtml(block.link)}" style="display:inline-block;padding:10px 18px;border:2px solid currentColor;border-radius:10px;color:inherit;font-weight:600">${escapeHtml(block.text)}</a><br><span style="font-size:14px">${escapeHtml(block.link)}</span></p>`
  }
}

function rowOf(group: { name: string; lines: readonly string[] }): string {
  return `<tr><th scope="row" style="${CELL};${MONO};white-space:nowrap">${escapeHtml(group.name)}</th><td style="${CELL}">${group.lines.map(escapeHtml).join('<br>')}</td></tr>`
}
