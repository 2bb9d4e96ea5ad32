/** Where a file is read: `thumb` a small picture, `full` the stored bytes. */
export function fileUrl(id: string, size: 'thumb' | 'full'): string {
  return `/api/files/${encodeURIComponent(id)}?size=${size}`;
}
