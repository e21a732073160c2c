/** A mail as far as the catcher's reader shows it. */
export interface ReadMail {
  from: string
  to: string
  subject: string
  date: string
  messageId: string
  text: string
  html: string
}

interface Part {
  headers: Map<string, string>
  body: string
}

/** Splits a part into headers (unfolded, names in lower case) and body; the text holds one character a byte. */
function split(source: string): Part {
  const end = source.search(/\r?\n\r?\n/)
  const head = (end < 0 ? source : source.slice(0, end)).replace(/\r?\n[ \t]+/g, ' ')
  const headers = new Map<string, string>()
  for (const line of head.split(/\r?\n/)) {
    const colon = line.indexOf(':')
    if (colon > 0) headers.set(line.slice(0, colon).toLowerCase(), line.slice(colon + 1).trim())
  }
  return { headers, body: end < 0 ? '' : source.slice(end).replace(/^(\r?\n){2}/, '') }
}

const utf8 = (bytes: string): string => Buffer.from(bytes, 'latin1').toString('utf8')
const unquote = (text: string): string => text.replace(/=([0-9A-Fa-f]{2})/g, (_, hex: string) => String.fromCharCode(parseInt(hex, 16)))

function decodeBody({ headers, body }: Part): string {
  const encoding = headers.get('content-transfer-encoding')?.toLowerCase()
  if (encoding === 'base64') return Buffer.from(body, 'base64').toString('utf8')
  return utf8(encoding === 'quoted-printable' ? unquote(body.replace(/=\r?\n/g, '')) : body)
}

/** RFC 2047: words such as =?UTF-8?Q?Erd=C5=91s?= in a header. */
function decodeHeader(value = ''): string {
  const decoded = value
    .replace(/(\?=)\s+(?==\?)/g, '$1')
    .replace(/=\?utf-8\?([bq])\?([^?]*)\?=/gi, (_, kind: string, text: string) =>
      kind.toLowerCase() === 'b' ? Buffer.from(text, 'base64').toString('latin1') : unquote(text.replaceAll('_', ' ')),
    )
  return utf8(decoded)
}

/** Every leaf of a message: the parts of a multipart, however deep. */
function leaves(part: Part): Part[] {
  const boundary = /boundary="?([^";]+)"?/i.exec(part.headers.get('content-type') ?? '')?.[1]
  if (boundary === undefined) return [part]
  return part.body
    .split(`--${boundary}`)
    .slice(1)
    .filter((piece) => !piece.startsWith('--'))
    .flatMap((piece) => leaves(split(piece.replace(/^\r?\n/, '').replace(/\r?\n$/, ''))))
}

/** Reads a message in UTF-8 with text and HTML, which is what the product sends. */
export function readMail(source: Buffer): ReadMail {
  const message = split(source.toString('latin1'))
  const parts = leaves(message)
  const body = (type: string) => {
    const part = parts.find(({ headers }) => (headers.get('content-type') ?? 'text/plain').toLowerCase().startsWith(type))
    return part ? decodeBody(part) : ''
  }
  const header = (name: string) => decodeHeader(message.headers.get(name))
  return { from: header('from'), to: header('to'), subject: header('subject'), date: header('date'), messageId: header('message-id'), text: body('text/plain'), html: body('text/html') }
}
