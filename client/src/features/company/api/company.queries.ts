import type { EditCompany, NewUnit, OwnCompanyView } from '@kerfyard/common/people';
import type { PlaceView } from '@kerfyard/common/places';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';

export const companyKeys = {
  own: ['company'] as const,
  place: (zip: string) => ['places', 'zip', zip] as const,
};

/** One's own company, with what each step of the ladder still needs. */
export const companyQuery = queryOptions({
  queryKey: companyKeys.own,
  queryFn: ({ signal }) => api.get<OwnCompanyView>('/api/company', { signal }),
  meta: { live: true },
});

/** What a ZIP code is known to be; a 404 for one that is not in the table. */
export function placeQuery(zip: string) {
  return queryOptions({
    queryKey: companyKeys.place(zip),
    queryFn: ({ signal }) => api.get<PlaceView>(`/api/places/zip/${encodeURIComponent(zip)}`, { signal }),
    enabled: /^\d{5}$/.test(zip),
    staleTime: Infinity,
  });
}

/** The zone at a position moved by hand. */
export function timeZoneAt(position: { lat: number; lon: number }): Promise<{ timeZone: string }> {
  return api.get<{ timeZone: string }>('/api/places/time-zone', { query: position });
}

/** Save the company; the answer replaces what is shown. */
export function useEditCompany() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: EditCompany) => api.put<OwnCompanyView>('/api/company', body),
    onSuccess: () => client.invalidateQueries({ queryKey: companyKeys.own }),
  });
}

/** Add a crew (people who go out together) or a truck. */
export function useAddUnit(kind: 'crews' | 'trucks') {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (unit: NewUnit) => api.post<void>(`/api/company/${kind}`, unit, { idempotencyKey: unit.id }),
    onSuccess: () => client.invalidateQueries({ queryKey: companyKeys.own }),
  });
}

/** Back from the provider's page: have the server read there how far the set-up is. */
export function useReadPayouts() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => api.post<void>('/api/company/payouts/refresh'),
    onSettled: () => client.invalidateQueries({ queryKey: companyKeys.own }),
  });
}

/** Ask for the payment provider's set-up page and go there; it returns to `/company?payouts=back`. */
export function useStartPayouts() {
  return useMutation({
    mutationFn: (idempotencyKey: string) =>
      api.post<{ url: string }>('/api/company/payouts', undefined, { idempotencyKey }),
    onSuccess: ({ url }) => {
      if (/^https?:\/\//.test(url)) window.location.assign(url);
    },
  });
}
