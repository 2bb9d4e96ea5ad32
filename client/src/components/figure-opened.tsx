import type { WorkingStep } from '@kerfyard/common/cutting';
import { Popover } from '@radix-ui/themes';
import type { ComponentProps, ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { Working } from './working.tsx';

interface FigureOpenedProps {
  label: string;
  figure: ReactNode;
  steps: readonly WorkingStep[];
  button: ComponentProps<'button'>;
}

/** The working beside its figure, open as soon as its code is here. */
export default function FigureOpened({ label, figure, steps, button }: FigureOpenedProps) {
  const { t } = useTranslation();
  return (
    <Popover.Root defaultOpen>
      <Popover.Trigger>
        <button {...button} />
      </Popover.Trigger>
      <Popover.Content maxWidth="min(30rem, calc(100vw - 2rem))" aria-label={t('figure.title', { label })}>
        <Working label={label} figure={figure} steps={steps} />
      </Popover.Content>
    </Popover.Root>
  );
}
