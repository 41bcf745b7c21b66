import { keepPreviousData, useQuery } from '@tanstack/react-query'
import { draftQuery } from '../../../api/shortlists.ts'
import { useDelayed } from '../../../lib/useDelayed.ts'
import { assemblyAddress, readAssembly, type AssemblyAddress } from './assemblyAddress.ts'

/** Missing invariants are computed meanwhile: then the counts are asked for again. */
const askAgain = 4_000

/** What the list would be, asked for when the choices have stood still for a moment. */
export function useDraft(campaign: string, assembly: AssemblyAddress, enabled: boolean) {
  const settled = readAssembly(new URLSearchParams(useDelayed(String(assemblyAddress(assembly)), 250)))
  const { searchIds, versionId, settings } = settled
  return useQuery({
    ...draftQuery(campaign, {
      ...settings,
      searchIds,
      ...(versionId === '' ? {} : { targetVersionId: versionId }),
    }),
    enabled: enabled && searchIds.length > 0,
    placeholderData: keepPreviousData,
    refetchInterval: ({ state }) =>
      settings.perInvariants !== null && (state.data?.counts?.withoutInvariants ?? 0) > 0 ? askAgain : false,
  })
}
