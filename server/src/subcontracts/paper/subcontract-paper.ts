import { takeoffCutList } from '@kerfyard/common/cutting';
import { figure } from '../cut.words.en.ts';
import type { PaperInput } from './paper-input.ts';
import { writeCutList } from './paper-cut-list.ts';
import {
  answerWords,
  belowWords,
  cautions,
  elementWords,
  holderWords,
  itemWords,
  postTensionWords,
  steelWords,
  wageWords,
} from './paper.words.en.ts';
import { PaperWriter } from './paper-writer.ts';
import { dateWords, dollars, instantWords } from '../format.ts';

/**
 * The subcontract as a PDF: parties, site, cut list with its sketch, what it rests on, who has what, price, terms and
 * cautions. Text is selectable and tagged. The same input gives the same bytes.
 * @returns the whole file
 * @throws CuttingInputError when the cut list cannot be taken off
 */
export async function renderSubcontractPaper(input: PaperInput): Promise<Buffer> {
  const writer = new PaperWriter({
    title: `Subcontract ${input.number}`,
    date: input.awardedAt,
    tagged: true,
  });
  writeParties(writer, input);
  writer.heading('1. The work');
  if (input.body.summary !== '') writer.paragraph(input.body.summary);
  writeCutList(writer, input.body.cuts, takeoffCutList({ cuts: input.body.cuts.map((line) => line.cut) }));
  writeFiles(writer, input);
  writeConditions(writer, input);
  writeResponsibilities(writer, input);
  writePrice(writer, input);
  writeInclusions(writer, input);
  writeTerms(writer, input);
  writer.heading('8. Cautions');
  writer.list(cautions);
  writer.heading('9. Signatures');
  writer.paragraph(
    `Both sides sign electronically by typing a name under this paper’s SHA-256 hash. The signature page is added behind the last page here and nothing before it changes. Unless both have signed by ${instantWords(input.signBy, input.body.site.timeZone)}, the award lapses.`,
  );
  return writer.finish(
    `Subcontract ${input.number} · scope ${input.scopeNumber}, revision ${input.revision}`,
  );
}

function writeParties(writer: PaperWriter, input: PaperInput): void {
  const { site } = input.body;
  writer.title(`Subcontract ${input.number}`, input.body.title);
  writer.facts([
    ['General contractor', `${input.gc.name}, ${input.gc.phone}`],
    ['Cutting contractor', `${input.crew.name}, ${input.crew.phone}`],
    ['Site', `${site.name}, ${site.address}, ${site.city}, ${site.state} ${site.zip}`],
    ...(site.contact === '' ? [] : ([['Contact at the site', site.contact]] as const)),
    ['Awarded', instantWords(input.awardedAt, site.timeZone)],
    [
      'On the basis of',
      `Scope ${input.scopeNumber}, revision ${input.revision}, and the cutting contractor’s bid on it`,
    ],
    ['Price', dollars(input.totalCents)],
  ]);
  writer.paragraph(
    `${input.gc.name} gives to ${input.crew.name}, and ${input.crew.name} takes on, the cutting described here at the price and on the terms below.`,
  );
}

function writeFiles(writer: PaperWriter, input: PaperInput): void {
  writer.heading('2. Drawings and photos');
  if (input.files.length === 0) {
    writer.paragraph('None were given with the scope.');
    return;
  }
  writer.paragraph('These files and no others, known by the hash of their bytes, show the work.');
  writer.table(
    [{ title: 'File', width: 190 }, { title: 'Kind', width: 84 }, { title: 'SHA-256' }],
    input.files.map((file) => [
      file.caption === '' ? file.name : `${file.name}\n${file.caption}`,
      file.pages === null || file.pages < 2 ? file.kind : `${file.kind}, ${file.pages} p.`,
      // Broken in two, since a hash has no place to wrap at.
      `${file.sha256.slice(0, 32)}\n${file.sha256.slice(32)}`,
    ]),
  );
}

function writeConditions(writer: PaperWriter, { body }: PaperInput): void {
  const { conditions } = body;
  const place = [conditions.face, conditions.indoors ? 'indoors' : 'outdoors', conditions.floor];
  writer.heading('3. Conditions at the site');
  writer.facts([
    ['Element', `${elementWords[conditions.element]} (${place.filter((part) => part !== '').join(', ')})`],
    ['Reinforcing steel', steelWords[conditions.steel]],
    ['Post-tension', postTensionWords[conditions.postTension]],
    ['Below or behind', belowWords[conditions.below]],
    ['Combustion engines', conditions.enginesAllowed ? 'allowed' : 'not allowed'],
    ['Overcuts at corners', conditions.overcutsAllowed ? 'allowed' : 'not allowed'],
    ...(conditions.workHours === '' ? [] : ([['Work hours', conditions.workHours]] as const)),
    ...(conditions.access === '' ? [] : ([['Access', conditions.access]] as const)),
  ]);
}

function writeResponsibilities(writer: PaperWriter, input: PaperInput): void {
  const companies = { gc: input.gc.name, crew: input.crew.name };
  const answers = new Map(input.bid.answers.map((answer) => [answer.item, answer.answer]));
  writer.heading('4. Responsibility sheet');
  writer.table(
    [
      { title: 'Item' },
      { title: 'Who has it', width: 190 },
      { title: 'Cutting contractor’s bid', width: 120 },
    ],
    input.body.responsibilities.map((row) => {
      const answer = answers.get(row.item);
      const holder = holderWords(row, companies);
      return [
        itemWords[row.item],
        row.by === 'not_needed' ? holder : { text: holder, strong: row.by === 'crew' },
        answer === undefined ? '' : answerWords[answer],
      ];
    }),
  );
}

function writePrice(writer: PaperWriter, input: PaperInput): void {
  writer.heading('5. Price and schedule of values');
  writer.table(
    [{ title: 'No.', width: 30 }, { title: 'Line' }, { title: 'Amount', width: 96, align: 'right' }],
    input.sov.map((row, index) => [String(index + 1), row.description, dollars(row.amountCents)]),
    { total: ['', 'Total', dollars(input.totalCents)] },
  );
}

function writeInclusions(writer: PaperWriter, { bid }: PaperInput): void {
  writer.heading('6. In the price and not in the price');
  const lists = [
    ['In the price', bid.inclusions],
    ['Not in the price', bid.exclusions],
  ] as const;
  for (const [name, items] of lists) {
    writer.paragraph(name, { strong: true });
    if (items.length === 0) writer.paragraph('Nothing besides what the responsibility sheet says.');
    else writer.list(items);
  }
  if (bid.note !== '') {
    writer.paragraph('Note of the bid', { strong: true });
    writer.paragraph(bid.note);
  }
}

function writeTerms(writer: PaperWriter, input: PaperInput): void {
  const { terms } = input.body;
  writer.heading('7. Terms');
  writer.list([
    `Work takes place between ${dateWords(terms.workFrom)} and ${dateWords(terms.workTo)}, in windows that the cutting contractor proposes and the general contractor confirms.${input.bid.startFrom === null ? '' : ` The cutting contractor can start from ${dateWords(input.bid.startFrom)}.`}`,
    'The general contractor sets aside the money for the lines of a visit before that visit starts. A crew does not start a visit whose lines are not set aside.',
    `When lines are done the cutting contractor says what was cut, with photos. The general contractor answers within ${terms.answerDays} calendar day${terms.answerDays === 1 ? '' : 's'}; what is accepted is released to the cutting contractor.`,
    terms.retainageBasisPoints === 0
      ? 'No retainage is held back.'
      : `Retainage of ${figure(terms.retainageBasisPoints / 100)} % is held back from each release until the work is done and accepted.`,
    `Standby: the first ${terms.standbyFreeMinutes} minutes of each visit are free; further waiting caused by the general contractor is paid as both agree in writing.`,
    `Wages: ${wageWords[terms.wages]}.`,
    'Changes count only when both sides have agreed to them in writing in Kerfyard. Kerfyard keeps the record and is no party to this subcontract.',
  ]);
  if (terms.notes !== '') writer.paragraph(terms.notes);
}
