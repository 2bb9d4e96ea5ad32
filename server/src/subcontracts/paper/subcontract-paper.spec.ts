import { PDFDocument, PDFName } from 'pdf-lib';
import { readPdfText } from '../../../test/pdf-text.ts';
import type { PaperInput } from './paper-input.ts';
import { samplePaper } from '../../../test/sample-paper.ts';
import { appendSignaturePage } from './signature-page.ts';
import { renderSubcontractPaper } from './subcontract-paper.ts';

/** Words as they stand on the page, line breaks and the space around them aside. */
const flat = (pages: readonly string[]): string => pages.join(' ').replace(/\s+/g, ' ');

async function textOf(change: Partial<PaperInput> = {}): Promise<string> {
  return flat(await readPdfText(await renderSubcontractPaper(samplePaper(change))));
}

describe('the paper of a subcontract', () => {
  it('gives the same bytes for the same input, others for another price', async () => {
    const [first, second, other] = await Promise.all([
      renderSubcontractPaper(samplePaper()),
      renderSubcontractPaper(samplePaper()),
      renderSubcontractPaper(samplePaper({ totalCents: 1_428_001 })),
    ]);
    expect(first.equals(second)).toBe(true);
    expect(first.equals(other)).toBe(false);
  });

  it('says, as text that can be selected, who, where, what, for how much and with which drawings', async () => {
    const text = await textOf();
    for (const part of [
      'Subcontract S-1007',
      'Hollis & Birch Builders, (937) 555-0140',
      'Stonewake Cutting, (937) 555-0188',
      'Alder Creek Hospital, 1200 Millrace Road, Dayton, OH 45402',
      'Scope K-1042, revision 1',
      // 14 cores of 10 in; 40 ft twice and 2 ft twice at 6 in.
      'Core 6 in dia., 10 in deep',
      'S-201 level 2 slab.pdf',
      '3b1f0c9a7e5d4f2688aa10d9c3e7b5f4',
      'not known: treat as present until proved otherwise',
      'Hauling and tip fees',
      'answers within 5 calendar days',
      'not for layout',
      'local codes and licensed practice decide',
      'December 18, 2026, 11:59 PM EST',
    ]) {
      expect(text).toContain(part);
    }
    // A row of the cut list, a row of the sheet and the total.
    expect(text).toMatch(
      /T1 Trench 40 × 2 ft, 6 in thick both sides cut; 2 end cuts Under the new drains 1 84 504 – 6,000/,
    );
    expect(text).toMatch(/Dust containment Stonewake Cutting not in the price/);
    expect(text).toMatch(/Total \$14,280\.00/);
  });

  it('is tagged, in English, and has a title', async () => {
    const document = await PDFDocument.load(await renderSubcontractPaper(samplePaper()), {
      updateMetadata: false,
    });
    expect(document.catalog.has(PDFName.of('StructTreeRoot'))).toBe(true);
    expect(String(document.catalog.get(PDFName.of('Lang')))).toContain('en-US');
    expect(document.getTitle()).toBe('Subcontract S-1007');
  });

  it('repeats the head of a table on each page and loses no row of a long cut list', async () => {
    const sample = samplePaper();
    const [first] = sample.body.cuts;
    const cuts = Array.from({ length: 120 }, (_, index) => ({ ...first!, mark: `X${index}` }));
    const pages = await readPdfText(
      await renderSubcontractPaper({ ...sample, body: { ...sample.body, cuts } }),
    );
    const text = flat(pages);
    for (const { mark } of cuts) expect(text).toContain(`${mark} Opening`);
    const withCuts = pages.filter((page) => /X\d+\s+Opening/.test(page));
    expect(withCuts.length).toBeGreaterThan(3);
    for (const page of withCuts) expect(page).toMatch(/Mark\s+Cut\s+Count/);
    expect(text).toContain('60 more cuts of the list are not drawn');
  });

  it('prints letters the font lacks without an accent, never as an empty box', async () => {
    const text = await textOf({ gc: { name: 'Łódź & Çelik Строй', phone: '1' } });
    expect(text).toContain('Lódz & Çelik ?????');
  });
});

describe('the signature page', () => {
  const signature = {
    number: 'S-1007',
    title: 'Lab wing',
    timeZone: 'America/New_York',
    documentSha256: 'ab'.repeat(32),
    signatures: [
      {
        side: 'gc' as const,
        company: 'Hollis & Birch Builders',
        personName: 'Nadia Voss',
        typedName: 'N. Voss',
        signedAt: new Date('2026-12-11T16:00:00.000Z'),
        ip: '192.0.2.7',
      },
      {
        side: 'crew' as const,
        company: 'Stonewake Cutting',
        personName: 'Ike Marlow',
        typedName: 'Isaac Marlow',
        signedAt: new Date('2026-12-12T16:00:00.000Z'),
        ip: '192.0.2.9',
      },
    ],
  };

  it('stands behind the pages of the paper, which stay as they are', async () => {
    const paper = await renderSubcontractPaper(samplePaper());
    const before = await readPdfText(paper);
    const after = await readPdfText(await appendSignaturePage(paper, signature));
    expect(after.slice(0, before.length)).toEqual(before);
    expect(after).toHaveLength(before.length + 1);
    const page = flat(after.slice(-1));
    for (const part of [
      'ab'.repeat(32),
      'N. Voss',
      'Isaac Marlow',
      '192.0.2.9',
      'December 12, 2026, 11:00 AM EST',
    ]) {
      expect(page).toContain(part);
    }
  });

  it('gives the same bytes for the same input', async () => {
    const paper = await renderSubcontractPaper(samplePaper());
    const [first, second] = await Promise.all([
      appendSignaturePage(paper, signature),
      appendSignaturePage(paper, signature),
    ]);
    expect(first.equals(second)).toBe(true);
  });
});
