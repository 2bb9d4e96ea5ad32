import { PDFDocument } from 'pdf-lib';
import { instantWords } from '../format.ts';
import { PaperWriter } from './paper-writer.ts';

export interface SignatureOnPaper {
  side: 'gc' | 'crew';
  company: string;
  /** The name of the account that signed. */
  personName: string;
  /** The name as typed. */
  typedName: string;
  signedAt: Date;
  ip: string;
}

export interface SignaturePageInput {
  number: string;
  title: string;
  timeZone: string;
  /** Of the stored paper that both signed. */
  documentSha256: string;
  signatures: readonly SignatureOnPaper[];
}

/**
 * The signed paper: the pages of the stored one as they are, and behind them a page that says who signed what, when
 * and from where. The same input gives the same bytes.
 */
export async function appendSignaturePage(paper: Uint8Array, input: SignaturePageInput): Promise<Buffer> {
  const document = await PDFDocument.load(paper, { updateMetadata: false });
  const page = await PDFDocument.load(await renderPage(input), { updateMetadata: false });
  for (const copied of await document.copyPages(page, page.getPageIndices())) document.addPage(copied);
  return Buffer.from(await document.save({ addDefaultPage: false, updateFieldAppearances: false }));
}

async function renderPage(input: SignaturePageInput): Promise<Buffer> {
  const last = input.signatures.at(-1);
  if (last === undefined) throw new RangeError('signatures: at least one is needed');
  const writer = new PaperWriter({
    title: `Subcontract ${input.number}, signatures`,
    date: last.signedAt,
    tagged: false,
  });
  writer.title('Signatures', `Subcontract ${input.number}: ${input.title}`);
  writer.paragraph(
    'Both sides signed the paper on the pages before this one, known by the SHA-256 hash of its stored bytes:',
  );
  writer.paragraph(input.documentSha256, { strong: true });
  for (const signature of input.signatures) {
    writer.heading(signature.side === 'gc' ? 'For the general contractor' : 'For the cutting contractor');
    writer.facts([
      ['Company', signature.company],
      ['Signed as', signature.typedName],
      ['By the account of', signature.personName],
      ['At', `${instantWords(signature.signedAt, input.timeZone)} (${signature.signedAt.toISOString()})`],
      ['From the address', signature.ip],
    ]);
  }
  writer.paragraph(
    'This page was added when the second signature was in. The paper without it is kept as well, under the hash above.',
    { quiet: true },
  );
  return writer.finish(`Subcontract ${input.number} · signature page`, { numbered: false });
}
