import { createContext, useContext, useEffect } from 'react';

/** Fields tell their form their label, so that the summary can name them. */
export const FormLabels = createContext<{ register: (name: string, label: string) => void }>({
  register: () => undefined,
});

export function useLabelInSummary(name: string, label: string): void {
  const { register } = useContext(FormLabels);
  useEffect(() => register(name, label), [register, name, label]);
}
