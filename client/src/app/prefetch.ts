import type { LoaderFunctionArgs } from 'react-router-dom'

/** Makes a loader that starts a page's query when its route is opened, without waiting for it. */
export type Prefetch = (start: (args: { params: LoaderFunctionArgs['params']; search: URLSearchParams }) => Promise<unknown>) => (args: LoaderFunctionArgs) => null
