import { queryOptions } from '@tanstack/react-query';
import type { Home } from '../../../shared/schemas/home';
import { request } from '../../lib/api';

export const homeQuery = (labId: string) =>
  queryOptions({
    queryKey: ['labs', labId, 'home'],
    queryFn: ({ signal }) => request<Home>(`/labs/${labId}/home`, { signal }),
  });
