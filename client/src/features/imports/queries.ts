import { useMutation, useQueryClient } from '@tanstack/react-query'
import type { ImportPreview, ImportResult } from '../../../../shared/schemas/import.ts'
import { api } from '../../lib/api-client.ts'
import { claimKeys } from '../claims/queries.ts'
import { constantKeys } from '../constants/queries.ts'
import { deskKeys } from '../desk/queries.ts'

function formOf(file: File): FormData {
  const form = new FormData()
  form.append('file', file)
  return form
}

/** What a table of digits would bring. */
export function usePreviewImport() {
  return useMutation({ mutationFn: (file: File) => api.upload<ImportPreview>('/imports/preview', formOf(file)) })
}

/** Drafts a claim for every readable line; after it everything that lists claims is read again. */
export function useImport() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (file: File) => api.upload<ImportResult>('/imports', formOf(file)),
    onSettled: () => Promise.all([claimKeys.all, constantKeys.all, deskKeys.all].map((queryKey) => client.invalidateQueries({ queryKey }))),
  })
}
