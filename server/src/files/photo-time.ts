import readExif from 'exif-reader';

interface RawTimes {
  DateTimeOriginal?: unknown;
  OffsetTimeOriginal?: unknown;
  OffsetTime?: unknown;
}

const OFFSET = /^([+-])(\d{2}):(\d{2})$/;

/**
 * When the camera says a photo was taken (EXIF 2.32: DateTimeOriginal with OffsetTimeOriginal). Without the offset the
 * clock's zone is unknown and a wrong instant would pass for evidence, so that gives null, as does anything unreadable.
 */
export function photoTime(exif: Buffer | undefined): Date | null {
  if (exif === undefined) return null;
  try {
    const times: RawTimes = readExif(exif).Photo ?? {};
    const local = times.DateTimeOriginal;
    const offset = OFFSET.exec(String(times.OffsetTimeOriginal ?? times.OffsetTime ?? '').trim());
    if (!(local instanceof Date) || Number.isNaN(local.getTime()) || offset === null) return null;
    const minutes = (Number(offset[2]) * 60 + Number(offset[3])) * (offset[1] === '-' ? -1 : 1);
    if (Math.abs(minutes) > 14 * 60) return null;
    return new Date(local.getTime() - minutes * 60_000);
  } catch {
    return null;
  }
}
