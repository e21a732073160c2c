import { useQuery } from '@tanstack/react-query'
import { useParams } from 'react-router-dom'
import { fetched } from '../../components/ui/fetched.tsx'
import { estimateQuery } from '../../features/estimates/queries.ts'
import { EstimateView } from './estimate-view.tsx'

export function EstimatePage() {
  const { id = '' } = useParams()
  return <EstimateView estimate={fetched(useQuery(estimateQuery(id)))} />
}
