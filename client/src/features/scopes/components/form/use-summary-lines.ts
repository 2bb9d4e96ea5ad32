import type { FieldIssue } from '@kerfyard/common/errors';
import { useTranslation } from 'react-i18next';
import type { SummaryLine } from '../../../../components/form/form-summary.tsx';
import type { DraftCut } from '../../cut-lines.ts';

/** More lines than this help nobody; the rest follow as these are answered. */
const SHOWN = 25;

/** The complaints of a draft as lines of the summary, each under its field's label and leading to it. */
export function useSummaryLines(
  issues: readonly FieldIssue[],
  labels: Readonly<Record<string, string>>,
  lines: readonly DraftCut[],
): SummaryLine[] {
  const { t } = useTranslation(['scopes', 'scope']);
  const labelOf = (path: string): string => {
    const cut = /^cuts\.(\d+)\.(?:cut\.)?(.+)$/.exec(path);
    if (cut !== null) {
      const mark = lines[Number(cut[1])]?.mark ?? String(Number(cut[1]) + 1);
      const field = (cut[2] ?? '').replace(/^removal\./, '');
      return `${mark}, ${t(`cuts.fields.${field}`)}`;
    }
    if (path === 'cuts') return t('cuts.title');
    if (path.startsWith('responsibilities')) return t('sheet.title');
    return labels[path] ?? '';
  };
  const shown = issues.slice(0, SHOWN).map(({ path, message }) => {
    const label = labelOf(path);
    return { name: path, text: label === '' ? message : `${label}: ${message}` };
  });
  const rest = issues.length - shown.length;
  return rest > 0 ? [...shown, { name: null, text: t('form.more', { count: rest }) }] : shown;
}
