import type { CompanyView } from '@kerfyard/common/api';
import type { OwnCompanyView } from '@kerfyard/common/people';
import { hospital, hospitalSleeves, mill, station, trench, warehouse } from './demo-scopes.ts';
import type { DemoPhotoName } from '../photos/index.ts';
import { DemoSteps } from './demo-steps.ts';
import type { DemoWorld } from './demo-world.ts';

const storyPhotos: readonly DemoPhotoName[] = [
  'trench_marked_on_pavement',
  'trench_sawn',
  ...[hospital, mill, station, warehouse].flatMap((scope) => scope.photos.map(([name]) => name)),
];

/**
 * Three weeks of invented work, so that every list has something in each state: drafts, open scopes with sealed and
 * ranked bids, bids in, an award to sign, work set aside and on site, work released and transferred.
 */
export async function tellDemoStory(world: DemoWorld, tell: (line: string) => void): Promise<void> {
  const steps = new DemoSteps(world);
  await world.setDaysAgo(24);
  await steps.drawAhead(storyPhotos);
  tell('People sign up and companies open');
  await world.castAll();
  tell('A trench is bid, awarded, cut and paid for');
  await finishedTrench(world, steps);
  tell('A mill floor is under contract and set aside');
  await millUnderWay(world, steps);
  tell('A concourse wall waits for signatures');
  await stationAwarded(world, steps);
  tell('Scopes closed, withdrawn and due');
  const due = await endedScopes(world, steps);
  await world.setDaysAgo(0);
  // Reading the bids once they are due opens them, as it would on any day.
  await world.as('wren').get(`/api/scopes/${due}/bids`);
  tell('Scopes are open now');
  await openNow(world, steps);
}

async function finishedTrench(world: DemoWorld, steps: DemoSteps): Promise<void> {
  const scope = await steps.publish('saoirse', trench, {
    mode: 'sealed',
    dueAt: await world.inDays(3),
    workFrom: await world.inDays(6),
  });
  await steps.lines('marisol', scope, { inchFoot: 1.45, core: 95, minimum: 900 });
  await steps.lump('june', scope.id, 4_350);
  await steps.lump('agnes', scope.id, 4_980, { exclusions: ['Slurry haul-off', 'Traffic control'] });
  await steps.say('marisol', scope.id, 'Is the street closed on the sewer side from the first day?');
  await world.setDaysAgo(20);
  const work = await steps.award('saoirse', scope.id, 'Quillback Concrete Cutting');
  await steps.sign('saoirse', 'Saoirse Bellweather', work);
  await steps.sign('marisol', 'Marisol Ferro', work);
  await steps.setAside('saoirse', work);
  const visit = await steps.propose('dag', work, [3, 4], 'We bring our own water tank.');
  await steps.confirm('ruben', visit);
  await world.setDaysAgo(16.9);
  await world.as('beto').post(`/api/visits/${visit.id}/start`);
  await world.setDaysAgo(16.6);
  await world.as('beto').post(`/api/visits/${visit.id}/finish`);
  const completion = await steps.complete(
    'beto',
    visit,
    ['trench_sawn'],
    'Both sides full depth, laterals done. Slurry vacuumed.',
  );
  await world.setDaysAgo(15);
  await world.as('ruben').post(`/api/completions/${completion}/accept`);
  await world.as('saoirse').post('/api/releases', { id: completion, completionId: completion });
  await world.until(
    'the transfer',
    async () => (await steps.read('marisol', work)).releases[0]?.status === 'transferred',
  );
}

async function millUnderWay(world: DemoWorld, steps: DemoSteps): Promise<void> {
  await world.setDaysAgo(12);
  const scope = await steps.publish('wren', mill, {
    mode: 'sealed',
    dueAt: await world.inDays(3),
    workFrom: await world.inDays(6),
  });
  await steps.lump('agnes', scope.id, 3_400);
  await steps.lines('marisol', scope, { inchFoot: 6.5, core: 130, minimum: 1_200 });
  await steps.lump('june', scope.id, 3_950, { answers: [{ item: 'cut', answer: 'included' }] });
  await world.setDaysAgo(8);
  const work = await steps.award('imani', scope.id, 'Quillback Concrete Cutting');
  await steps.sign('imani', 'Imani Achterberg', work);
  await steps.sign('marisol', 'Marisol Ferro', work);
  await steps.setAside('teodor', work);
  await steps.say(
    'wren',
    scope.id,
    'The mezzanine crane is booked from Tuesday; the stair opening first, please.',
    await companyOf(world, 'marisol'),
  );
  await world.setDaysAgo(1);
  const visit = await steps.propose('dag', work, [1.1, 2.1], 'Stair opening first, then the sinks.');
  await steps.confirm('wren', visit);
}

async function stationAwarded(world: DemoWorld, steps: DemoSteps): Promise<void> {
  await world.setDaysAgo(9);
  const scope = await steps.publish('delphine', station, {
    mode: 'ranked',
    dueAt: await world.inDays(4),
    workFrom: await world.inDays(10),
    retainageBasisPoints: 500,
  });
  await steps.lump('ezra', scope.id, 16_800);
  await steps.lump('marisol', scope.id, 15_900);
  await steps.lump('june', scope.id, 17_400, { exclusions: ['Catching and pumping slurry'] });
  await steps.lump('ezra', scope.id, 15_400);
  await world.setDaysAgo(4);
  const work = await steps.award('delphine', scope.id, 'Lantern Street Coring');
  await steps.sign('delphine', 'Delphine Marsh', work);
}

/** Gives the id of a scope whose bids are in when the story ends. */
async function endedScopes(world: DemoWorld, steps: DemoSteps): Promise<string> {
  await world.setDaysAgo(7);
  const closed = await steps.publish(
    'saoirse',
    { ...trench, title: 'Quarry Lane, second bay' },
    { mode: 'sealed', dueAt: await world.inDays(2), workFrom: await world.inDays(9) },
  );
  const withdrawn = await steps.publish(
    'delphine',
    { ...station, title: 'Ticket window only' },
    { mode: 'sealed', dueAt: await world.inDays(5), workFrom: await world.inDays(9) },
  );
  await world.as('delphine').post(`/api/scopes/${withdrawn.id}/withdraw`);
  const due = await steps.publish('wren', hospitalSleeves, {
    mode: 'sealed',
    dueAt: await world.inDays(6.5),
    workFrom: await world.inDays(12),
  });
  await steps.lump('marisol', due.id, 1_050);
  await steps.lump('agnes', due.id, 980, {
    answers: [
      { item: 'cut', answer: 'included' },
      { item: 'slurry', answer: 'excluded' },
    ],
  });
  await steps.lump('june', due.id, 1_240);
  await world.setDaysAgo(4.5);
  await world.as('saoirse').get(`/api/scopes/${closed.id}/bids`);
  await world
    .as('saoirse')
    .post(`/api/scopes/${closed.id}/close`, { reason: 'The second bay is put off to spring.' });
  return due.id;
}

async function openNow(world: DemoWorld, steps: DemoSteps): Promise<void> {
  const big = await steps.publish('wren', hospital, {
    mode: 'sealed',
    dueAt: await world.inDays(4),
    workFrom: await world.inDays(12),
    retainageBasisPoints: 500,
  });
  await steps.lines('marisol', big, { inchFoot: 9, core: 160, minimum: 1_800 });
  await steps.lump('june', big.id, 7_900);
  await steps.say('marisol', big.id, 'May we stage the vacuum in the soiled-linen corridor overnight?');
  await steps.say(
    'wren',
    big.id,
    'Yes, from 20:00. Otis meets you at gate 4.',
    await companyOf(world, 'marisol'),
  );
  const ranked = await steps.publish(
    'delphine',
    { ...station, title: 'Concourse wall, second night: sleeves and window' },
    { mode: 'ranked', dueAt: await world.inDays(2), workFrom: await world.inDays(14) },
  );
  await steps.lump('ezra', ranked.id, 14_300);
  await steps.lump('marisol', ranked.id, 13_950);
  await steps.lump('june', ranked.id, 14_900);
  await steps.publish(
    'saoirse',
    { ...warehouse },
    { mode: 'sealed', dueAt: await world.inDays(6), workFrom: await world.inDays(10) },
  );
  await steps.publish(
    'saoirse',
    { ...trench, title: 'Quarry Lane laterals, north side' },
    { mode: 'sealed', dueAt: await world.inDays(1), workFrom: await world.inDays(5) },
  );
  await steps.draft(
    'wren',
    { ...mill, title: 'Mill, building 4: sink pockets' },
    { mode: 'sealed', dueAt: await world.inDays(9), workFrom: await world.inDays(15) },
  );
}

async function companyOf(world: DemoWorld, person: string): Promise<{ crewCompanyId: string }> {
  const company: CompanyView = await world.as(person).get<OwnCompanyView>('/api/company');
  return { crewCompanyId: company.id };
}
