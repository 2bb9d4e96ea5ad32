/** Where the client shows a subcontract; e-mails lead there. */
export function workPath(subcontractId: string, part?: 'money' | 'visits' | 'completions' | 'paper'): string {
  return part === undefined ? `/work/${subcontractId}` : `/work/${subcontractId}/${part}`;
}
