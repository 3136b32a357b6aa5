import {
  correctionSource,
  correctionSourceList,
  type CorrectionSourceBody,
} from '@hubtack/contracts/corrections/correction-source.js';
import { queryOptions } from '@tanstack/react-query';
import { api } from './api';
import { useChange } from './use-change';

export const correctionSourcesQuery = queryOptions({
  queryKey: ['correctionSources'],
  queryFn: () => api(correctionSourceList, 'GET', '/api/correction-sources'),
});

const touches = [correctionSourcesQuery.queryKey];
export const useAddCorrectionSource = () =>
  useChange(
    (body: CorrectionSourceBody) => api(correctionSource, 'POST', '/api/correction-sources', body),
    touches,
  );
export const useChangeCorrectionSource = (id: number) =>
  useChange(
    (body: CorrectionSourceBody) => api(correctionSource, 'PUT', `/api/correction-sources/${id}`, body),
    touches,
  );
