import {
  importDone,
  importPreview,
  type ImportBody,
  type ImportKind,
} from '@hubtack/contracts/imports/import.js';
import { useMutation } from '@tanstack/react-query';
import { api } from './api';
import { useChange } from './use-change';

export const usePreviewImport = (kind: ImportKind) =>
  useMutation({
    mutationFn: (text: string) => api(importPreview, 'POST', `/api/imports/${kind}/preview`, { text }),
  });
/** The kinds are named as their lists' queries are. */
export const useImport = (kind: ImportKind) =>
  useChange((body: ImportBody) => api(importDone, 'POST', `/api/imports/${kind}`, body), [[kind]]);
