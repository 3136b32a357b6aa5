import { useMutation, useQueryClient, type QueryKey } from '@tanstack/react-query';

/** A change on the server, after which these queries are read anew. */
export function useChange<Body, Answer>(
  change: (body: Body) => Promise<Answer>,
  touches: readonly QueryKey[],
) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: change,
    onSuccess: () => Promise.all(touches.map((queryKey) => client.invalidateQueries({ queryKey }))),
  });
}
