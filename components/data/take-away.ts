import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import {
  blockFrameEndpoints,
  cutPathEndpoints,
  type BlockFrameForm,
  type TakeAwayFormat,
  type takeAwayUnits,
} from '@/shared/take-away.ts';
import { apiCall, apiFile } from './call.ts';
import { machineQuery, machinesQuery } from './machines.ts';
import { saveFile } from './save-file.ts';

/** A plan's path, of the version that is seen: planned again it is another. */
export const cutPathQuery = (planId: string, version: number) =>
  queryOptions({
    queryKey: ['cut-paths', planId, version],
    queryFn: ({ signal }) => apiCall(cutPathEndpoints.show, { params: { planId }, signal }),
  });

type Taken = { planId: string; as: TakeAwayFormat; unit: (typeof takeAwayUnits)[number] };

/** Has the file made and saves it on this device; nothing is saved when it can't be made. */
export function useCutPathTake() {
  return useMutation({
    mutationFn: async ({ planId, as, unit }: Taken) => {
      const file = await apiFile(cutPathEndpoints.take, { params: { planId }, query: { as, unit } });
      saveFile(file);
      return file.name;
    },
  });
}

export const blockFrameQuery = (machineId: string) =>
  queryOptions({
    queryKey: ['block-frames', machineId],
    queryFn: ({ signal }) => apiCall(blockFrameEndpoints.get, { params: { machineId }, signal }),
  });

export function useBlockFrameChange(machineId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ version, body }: { version: number; body: BlockFrameForm }) =>
      apiCall(blockFrameEndpoints.change, { params: { machineId }, body, version }),
    onSuccess: async (frame) => {
      client.setQueryData(blockFrameQuery(machineId).queryKey, frame);
      // the machine has moved on by one version
      await Promise.all(
        [machineQuery(machineId).queryKey, machinesQuery().queryKey].map((queryKey) =>
          client.invalidateQueries({ queryKey }),
        ),
      );
    },
  });
}
