import { Html, html } from './html'

/**
 * The paper that every letter is written on. Styles stand in style attributes only: many mail programs throw a style
 * sheet away, and the mail room's own policy forbids one. Every colour names
 * its day and its night together, paper and ink alike; a program that does not know `light-dark` keeps its own for all of them.
 */
const FONT = "font-family:'Nunito Sans','Segoe UI',Roboto,'Helvetica Neue',Arial,sans-serif"
export const LINK = 'color:light-dark(#1B5A96,#86B8E8)'
export const SMALL = 'font-size:14px;opacity:0.85'
const PAPER = 'background-color:light-dark(#FFFFFF,#1E2126);color:light-dark(#22262B,#ECE7DA)'
const RULE = 'border-color:light-dark(#D8D0BE,#5A606A)'
export const CELL = `padding:10px 12px 10px 0;border-top:1px solid #B9B2A2;${RULE};vertical-align:top;text-align:left`

interface Page {
  title: string
  /** What a list of letters shows beside the subject. */
  preview: string
  body: Html
  foot: Html
}

/** One whole HTML document with nothing in it that is fetched from anywhere. */
export function page({ title, preview, body, foot }: Page): string {
  return html`<!DOCTYPE html>
<html lang="en" style="color-scheme:light dark">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="color-scheme" content="light dark">
<meta name="supported-color-schemes" content="light dark">
<title>${title}</title>
</head>
<body style="margin:0;padding:24px 16px;${new Html(PAPER)};${new Html(FONT)};font-size:16px;line-height:1.5">
<div style="display:none;max-height:0;overflow:hidden;opacity:0">${preview}</div>
<main style="display:block;max-width:640px;margin:0 auto;overflow-wrap:anywhere">
${body}
<div style="margin-top:28px;padding-top:12px;border-top:1px solid #B9B2A2;${new Html(RULE)};${new Html(SMALL)}">
${foot}
</div>
</main>
</body>
</html>
`.source
}

export const heading = (text: string): Html =>
  html`<h2 style="font-size:17px;line-height:1.3;margin:24px 0 8px;page-break-after:avoid">${text}</h2>`

export const link = (href: string, text: string): Html => html`<a href="${href}" style="${new Html(LINK)}">${text}</a>`
