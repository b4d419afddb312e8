import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { BodyOf } from '@/shared/endpoint.ts';
import { reportEndpoints, type Report } from '@/shared/reports.ts';
import { apiAddress, apiCall } from './call.ts';
import { strategiesRoot } from './roots.ts';

const root = ['reports'] as const;

export const reportsQuery = () =>
  queryOptions({
    queryKey: [...root, 'list'],
    queryFn: async ({ signal }) => (await apiCall(reportEndpoints.list, { signal })).items,
  });

export const reportQuery = (reportId: string) =>
  queryOptions({
    queryKey: [...root, 'one', reportId],
    queryFn: ({ signal }) => apiCall(reportEndpoints.get, { params: { reportId }, signal }),
  });

/** Where a report's picture lies. */
export const reportPhotoAddress = (reportId: string): string =>
  apiAddress(reportEndpoints.photo, { params: { reportId } });

export function useReportAdd() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ body, photo }: { body: BodyOf<typeof reportEndpoints.add>; photo: File | null }) =>
      apiCall(reportEndpoints.add, { body, file: photo }),
    onSuccess: async () => {
      await Promise.all([root, strategiesRoot].map((queryKey) => client.invalidateQueries({ queryKey })));
    },
  });
}

export function useReportClose() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ report, words }: { report: Pick<Report, 'id' | 'version'>; words: string }) =>
      apiCall(reportEndpoints.close, { params: { reportId: report.id }, body: { words }, version: report.version }),
    onSuccess: async (report) => {
      client.setQueryData(reportQuery(report.id).queryKey, report);
      await Promise.all([root, strategiesRoot].map((queryKey) => client.invalidateQueries({ queryKey })));
    },
  });
}
