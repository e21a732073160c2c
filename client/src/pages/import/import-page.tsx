import { useState } from 'react'
import { useImport, usePreviewImport } from '../../features/imports/queries.ts'
import { ImportView } from './import-view.tsx'

export function ImportPage() {
  const [file, setFile] = useState<File | null>(null)
  const preview = usePreviewImport()
  const taken = useImport()
  return (
    <ImportView
      fileName={file?.name ?? null}
      preview={preview.data ?? null}
      busy={preview.isPending || taken.isPending}
      error={preview.error ?? taken.error}
      result={taken.data ?? null}
      onFile={(chosen) => {
        setFile(chosen)
        taken.reset()
        preview.mutate(chosen)
      }}
      onImport={() => file && taken.mutate(file)}
    />
  )
}
