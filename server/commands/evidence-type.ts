/** What a file is, told from its bytes alone; its name has to agree. */
export type EvidenceType = { ok: true; mediaType: string } | { ok: false; reason: string }

interface Kind {
  word: string
  mediaType: string
  /** Endings that a name of this kind may have. */
  endings: readonly string[]
  matches: (content: Buffer) => boolean
}

const begins = (...bytes: number[]) => (content: Buffer): boolean => bytes.every((byte, index) => content[index] === byte)
const text = (value: string, at = 0) => (content: Buffer): boolean => content.toString('latin1', at, at + value.length) === value

const BINARY: readonly Kind[] = [
  { word: 'a PDF', mediaType: 'application/pdf', endings: ['pdf'], matches: text('%PDF-') },
  { word: 'a PNG image', mediaType: 'image/png', endings: ['png'], matches: begins(0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a) },
  { word: 'a JPEG image', mediaType: 'image/jpeg', endings: ['jpg', 'jpeg'], matches: begins(0xff, 0xd8, 0xff) },
  { word: 'a ZIP archive', mediaType: 'application/zip', endings: ['zip'], matches: begins(0x50, 0x4b, 0x03, 0x04) },
  { word: 'a gzip file', mediaType: 'application/gzip', endings: ['gz', 'tgz'], matches: begins(0x1f, 0x8b, 0x08) },
  { word: 'a tar archive', mediaType: 'application/x-tar', endings: ['tar'], matches: text('ustar', 257) },
]

/** Endings that a text may not have: those of the other kinds, and those that a computer would open as a page or run. */
const NOT_FOR_TEXT = new Set([...BINARY.flatMap(({ endings }) => endings), 'html', 'htm', 'xhtml', 'xht', 'shtml', 'svg', 'svgz', 'hta', 'exe', 'dll', 'com', 'scr', 'msi', 'bat', 'cmd', 'lnk', 'jar', 'vbs', 'wsf'])

/** A page or a drawing that a browser would run scripts in, by its first tag (after a byte order mark, white space, comments, a prolog). */
const MARKUP = /^\ufeff?\s*(?:<\?xml[^>]*\?>\s*|<!--[\s\S]*?-->\s*)*<(?:!doctype|html|head|body|svg|script|iframe|xsl:|[a-z]+:(?:html|svg|script))\b/i
const ANYWHERE = /<(?:script|iframe|html|svg|body)[\s>]/i
/** Control characters that no text has. */
// eslint-disable-next-line no-control-regex
const CONTROL = /[\u0000-\u0008\u000b\u000e-\u001a\u001c-\u001f\u007f]/

/** Tells what an uploaded file is, or why it is not taken. */
export function evidenceType(content: Buffer, name: string): EvidenceType {
  if (content.length === 0) return { ok: false, reason: 'The file is empty.' }
  const ending = /\.([^.]+)$/.exec(name)?.[1]?.toLowerCase()
  const kind = BINARY.find(({ matches }) => matches(content))
  if (kind) {
    if (ending !== undefined && !kind.endings.includes(ending)) return { ok: false, reason: `The content is ${kind.word}, but the name ends in .${ending}. Rename the file, if it is the right one.` }
    return { ok: true, mediaType: kind.mediaType }
  }
  const read = utf8(content)
  if (read === undefined) return { ok: false, reason: 'Evidence is a PDF, a text in UTF-8, a CSV, a PNG or JPEG image, or a ZIP, gzip or tar archive. This file is none of them.' }
  if (MARKUP.test(read) || ANYWHERE.test(read.slice(0, 1024))) return { ok: false, reason: 'HTML and SVG are not taken, since they can run scripts. Upload a PDF or an image of the page.' }
  if (ending !== undefined && NOT_FOR_TEXT.has(ending)) return { ok: false, reason: `The content is plain text, but the name ends in .${ending}. Rename the file, if it is the right one.` }
  return { ok: true, mediaType: isTable(read) ? 'text/csv' : 'text/plain' }
}

function utf8(content: Buffer): string | undefined {
  try {
    const read = new TextDecoder('utf-8', { fatal: true }).decode(content)
    return CONTROL.test(read) ? undefined : read
  } catch {
    return undefined
  }
}

/** Whether the first lines all have the same number of columns, two or more. */
function isTable(read: string): boolean {
  const lines = read.slice(0, 65_536).split(/\r?\n/).filter((line) => line.trim() !== '').slice(0, 50)
  // Where the sample was cut, so was its last line.
  if (read.length > 65_536 && lines.length < 50) lines.pop()
  if (lines.length < 2) return false
  return [',', ';', '\t'].some((separator) => {
    const columns = lines.map((line) => line.replace(/"(?:[^"]|"")*"/g, '').split(separator).length)
    return columns[0] !== undefined && columns[0] > 1 && columns.every((count) => count === columns[0])
  })
}

/** Characters that hide what a name is: controls, and those that turn the direction of writing. */
// eslint-disable-next-line no-control-regex
const HIDING = /[\u0000-\u001f\u007f-\u009f\u200b-\u200f\u202a-\u202e\u2060-\u2069\ufeff]/g

/** A file's name as it is kept: no folders, nothing that hides its ending, at most 200 characters. */
export function cleanName(given: string): string {
  const base = given.normalize('NFC').split(/[/\\]/).at(-1)?.replace(HIDING, '').trim() ?? ''
  const characters = [...base]
  if (characters.length <= 200) return base === '' || /^\.+$/.test(base) ? 'evidence' : base
  const ending = /\.[^.]{1,10}$/.exec(base)?.[0] ?? ''
  return characters.slice(0, 200 - ending.length).join('') + ending
}
