/** Photos and drawings: what is taken, how much, and what others see of one. */
export const fileLimits = {
  maxBytes: 25 * 1024 * 1024,
  maxFilesPerRequest: 10,
  maxFilesPerScope: 60,
  maxMegapixels: 50,
  maxPdfPages: 200,
  maxNameLength: 200,
} as const;

/** Types by content; the extension and the declared type must agree with what the bytes are. */
export const acceptedFileTypes = {
  'image/jpeg': ['jpg', 'jpeg'],
  'image/png': ['png'],
  'image/webp': ['webp'],
  'application/pdf': ['pdf'],
} as const;
export type AcceptedFileType = keyof typeof acceptedFileTypes;

export type FileKind = 'photo' | 'drawing' | 'document';

export interface FileView {
  id: string;
  kind: FileKind;
  name: string;
  caption: string;
  type: AcceptedFileType;
  bytes: number;
  sha256: string;
  width: number | null;
  height: number | null;
  pages: number | null;
  takenAt: string | null;
  uploadedAt: string;
}

/** Answer to one upload request: each file stands alone, so one bad file does not lose the good ones. */
export interface UploadResult {
  files: FileView[];
  refused: { name: string; code: 'too_large' | 'wrong_type' | 'unreadable' | 'too_many'; message: string }[];
}
