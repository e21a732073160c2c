import { QueryClientProvider } from '@tanstack/react-query'
import { useState } from 'react'
import { RouterProvider } from 'react-router-dom'
import { createQueryClient } from './query-client.ts'
import { createRouter } from './router.tsx'

/** The whole client: one query client and the routes that prefetch into it. */
export function Application() {
  const [client] = useState(createQueryClient)
  const [router] = useState(() => createRouter(client))
  return (
    <QueryClientProvider client={client}>
      <RouterProvider router={router} />
    </QueryClientProvider>
  )
}
