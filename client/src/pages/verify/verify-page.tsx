import { useState } from 'react'
import { readCertificate } from '../../../../shared/schemas/certificate.ts'
import { VerifyView } from './verify-view.tsx'
import type { Dropped } from './verify-view.tsx'

/** No certificate comes near this; a larger file is none and would only stop the page. */
const MOST_BYTES = 50 * 1024 * 1024

async function read(file: File): Promise<Dropped> {
  if (file.size > MOST_BYTES) return { name: file.name, problem: 'It is larger than any certificate (50 MB).' }
  try {
    const result = readCertificate(await file.text())
    return 'problem' in result ? { name: file.name, problem: result.problem } : { name: file.name, certificate: result.certificate }
  } catch {
    return { name: file.name, problem: 'The browser could not read the file.' }
  }
}

export function VerifyPage() {
  const [dropped, setDropped] = useState<Dropped | null>(null)
  return <VerifyView dropped={dropped} onFile={(file) => void read(file).then(setDropped)} />
}
