'use client'
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query'
import { ask, RefusedError } from '@/components/ui/ask'
import type { SortingTable } from '@/lib/core/sorting'
import type { SortingAct } from '@/lib/core/sorting-act'

type Refused = Readonly<{ error: RefusedError; act: SortingAct }>
type Sorting = Readonly<{ table: SortingTable; busy: boolean; savedAt: number | null; refused: Refused | null; act: (act: SortingAct) => Promise<boolean>; forgive: () => void }>

/** The table as the server has it, and the one way to change it: an act, answered by the table as it then stands. */
export function useSorting(start: SortingTable): Sorting {
  const key = ['sorting', start.paperId]
  const path = `/api/papers/${start.paperId}/sorting`
  const client = useQueryClient()
  const { data } = useQuery({ queryKey: key, queryFn: () => ask<SortingTable>(path), initialData: start, refetchInterval: ({ state }) => ((state.data?.reading ?? 0) > 0 ? 2000 : false) })
  const change = useMutation({
    mutationFn: (act: SortingAct) => ask<SortingTable>(path, { json: act }),
    onMutate: () => client.cancelQueries({ queryKey: key }),
    onSuccess: (table) => client.setQueryData(key, table),
    onError: (error) => { if (error instanceof RefusedError && (error.code === 'out_of_date' || error.code === 'not_found')) void client.invalidateQueries({ queryKey: key }) },
  })
  return {
    table: data, busy: change.isPending, savedAt: change.isSuccess ? change.submittedAt : null,
    refused: change.isError ? { error: change.error instanceof RefusedError ? change.error : new RefusedError(0, 'failed', {}), act: change.variables } : null,
    act: (act) => change.mutateAsync(act).then(() => true, () => false),
    forgive: change.reset,
  }
}
