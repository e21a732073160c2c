/** One record of a CSV text, with the number of the line that it begins on. */
export interface CsvRecord {
  line: number
  fields: string[]
}

/**
 * Reads CSV as RFC 4180 has it: fields apart by commas, or by semicolons where the first line has more of them; quoted fields may hold
 * separators, line breaks and doubled quotes. Empty lines are passed over. A quote that is never closed runs to the end of the text.
 */
export function parseCsv(text: string): CsvRecord[] {
  const head = text.slice(0, text.indexOf('\n') < 0 ? text.length : text.indexOf('\n'))
  const separator = head.split(';').length > head.split(',').length ? ';' : ','
  const records: CsvRecord[] = []
  let [line, begun, field, quoted] = [1, 1, '', false]
  let fields: string[] = []
  const endField = (): void => {
    fields.push(field.trim())
    field = ''
  }
  const endRecord = (): void => {
    endField()
    if (fields.some((one) => one !== '')) records.push({ line: begun, fields })
    fields = []
    begun = line
  }
  for (let i = 0; i < text.length; i++) {
    const c = text[i]
    if (c === '\n') line += 1
    if (quoted) {
      if (c !== '"') field += c
      else if (text[i + 1] === '"') field += text[++i]
      else quoted = false
    } else if (c === '"' && field.trim() === '') [quoted, field] = [true, '']
    else if (c === separator) endField()
    else if (c === '\n') endRecord()
    else if (c !== '\r') field += c
  }
  endRecord()
  return records
}
