import sharp from 'sharp';
import { prepareImage } from '../../files/prepare-image.ts';
import { encodePhoto } from './encode-photo.ts';
import { render } from './render.ts';
import { demoScenes, type DemoPhotoName } from './scenes.ts';

const [width, height] = [120, 90];
const pictures = new Map(
  (Object.keys(demoScenes) as DemoPhotoName[]).map((name) => [
    name,
    render(demoScenes[name](), width, height),
  ]),
);

describe('the demo’s pictures', () => {
  it.each([...pictures.keys()])('%s is no flat box: light and dark, and coloured', async (name) => {
    const { channels } = await sharp(pictures.get(name), { raw: { width, height, channels: 3 } }).stats();
    for (const channel of channels) {
      expect(channel.stdev).toBeGreaterThan(12);
      expect(channel.max - channel.min).toBeGreaterThan(120);
    }
    expect(new Set(channels.map((channel) => Math.round(channel.mean))).size).toBeGreaterThan(1);
  });

  it('are all different, and the same at every run', () => {
    const texts = [...pictures.values()].map((pixels) => pixels.toString('base64'));
    expect(new Set(texts).size).toBe(texts.length);
    expect(render(demoScenes.sawn_joints(), width, height).equals(pictures.get('sawn_joints')!)).toBe(true);
  });

  it('come through an upload with the time they were taken', async () => {
    const pixels = pictures.get('slab_with_layout')!;
    const time = { takenAt: '2026-11-20T09:12:33', offset: '-05:00' };
    const jpeg = await encodePhoto({ pixels, width, height }, { ...time, widthPx: 100 });
    const kept = await prepareImage(jpeg, 'image/jpeg');
    expect([kept.width, kept.height, kept.takenAt?.toISOString()]).toEqual([
      100,
      75,
      '2026-11-20T14:12:33.000Z',
    ]);
  });
});
