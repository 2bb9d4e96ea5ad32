import { z } from 'zod';
import { idSchema, textSchema, type CompanyView, type PersonView } from '../api/index.ts';
import type { FileView } from '../files/index.ts';

export const postMessageSchema = z
  .strictObject({
    id: idSchema,
    body: textSchema(4000, 0).default(''),
    fileIds: z.array(idSchema).max(10).default([]),
  })
  .refine((m) => m.body.length > 0 || m.fileIds.length > 0, {
    path: ['body'],
    message: 'Write something or add a photo',
  });
export type PostMessage = z.output<typeof postMessageSchema>;

export const readThreadSchema = z.strictObject({ seq: z.number().int().min(0) });

/** A general contractor opens a thread with one bidder; a crew opens its own with the scope's company. */
export const openThreadSchema = z.strictObject({ crewCompanyId: idSchema.optional() });

export interface MessageView {
  id: string;
  seq: number;
  author: PersonView;
  company: CompanyView;
  isOwn: boolean;
  body: string;
  files: FileView[];
  sentAt: string;
}

/** A thread per scope and bidder (logistics before due), which goes on as the subcontract's once there is one. */
export interface ThreadView {
  id: string;
  scopeId: string;
  subcontractId: string | null;
  title: string;
  otherSide: CompanyView;
  lastMessage: { body: string; sentAt: string; authorName: string } | null;
  unread: number;
}
