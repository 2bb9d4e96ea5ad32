import type { FileView, UploadResult } from '@kerfyard/common/files';
import { act, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { renderInApp } from '../test/render.tsx';
import { FileUploader } from './file-uploader.tsx';

/** Stands for the line: each request waits until the test answers it. */
class FakeRequest {
  static sent: FakeRequest[] = [];
  upload: {
    onprogress: ((event: { lengthComputable: boolean; loaded: number; total: number }) => void) | null;
  } = {
    onprogress: null,
  };
  onload: (() => void) | null = null;
  onerror: (() => void) | null = null;
  onabort: (() => void) | null = null;
  status = 0;
  responseText = '';
  headers: Record<string, string> = {};
  body: FormData | null = null;
  aborted = false;

  open() {
    // Address and method are fixed.
  }
  setRequestHeader(name: string, value: string) {
    this.headers[name] = value;
  }
  send(body: FormData) {
    this.body = body;
    FakeRequest.sent.push(this);
  }
  abort() {
    this.aborted = true;
    this.onabort?.();
  }
  answer(status: number, body: UploadResult | object) {
    this.status = status;
    this.responseText = JSON.stringify(body);
    act(() => this.onload?.());
  }
  get name() {
    return (this.body?.get('files') as File).name;
  }
}

const view = (name: string): FileView => ({
  id: name,
  kind: 'photo',
  name,
  caption: '',
  type: 'image/jpeg',
  bytes: 3,
  sha256: '',
  width: 1,
  height: 1,
  pages: null,
  takenAt: null,
  uploadedAt: '2026-12-01T00:00:00.000Z',
});
const photo = (name: string) => new File(['abc'], name, { type: 'image/jpeg' });
const request = (name: string) => {
  const found = FakeRequest.sent.findLast((item) => item.name === name);
  if (found === undefined) throw new Error(`${name} was not sent`);
  return found;
};

beforeEach(() => {
  FakeRequest.sent = [];
  vi.stubGlobal('XMLHttpRequest', FakeRequest);
});
afterEach(() => vi.unstubAllGlobals());

function show() {
  const arrived: FileView[] = [];
  renderInApp(
    <FileUploader kind="photo" label="Photos of the place" onUploaded={(file) => arrived.push(file)} />,
  );
  return {
    arrived,
    choose: (files: File[]) =>
      userEvent.upload(screen.getByLabelText('Photos of the place'), files, { applyAccept: false }),
  };
}

describe('FileUploader', () => {
  it('sends several files two at a time and hands over each that arrives', async () => {
    const { arrived, choose } = show();
    await choose([photo('a.jpg'), photo('b.jpg'), photo('c.jpg')]);
    await waitFor(() => expect(FakeRequest.sent).toHaveLength(2));
    expect(request('a.jpg').headers['X-Kerfyard']).toBe('1');
    expect(request('a.jpg').headers['Idempotency-Key']).not.toBe(request('b.jpg').headers['Idempotency-Key']);
    expect([...(request('a.jpg').body?.keys() ?? [])]).toEqual(['kind', 'files']);
    request('a.jpg').answer(201, { files: [view('a.jpg')], refused: [] });
    await waitFor(() => expect(FakeRequest.sent).toHaveLength(3));
    request('b.jpg').answer(201, { files: [view('b.jpg')], refused: [] });
    request('c.jpg').answer(201, { files: [view('c.jpg')], refused: [] });
    await waitFor(() => expect(arrived.map((file) => file.name)).toEqual(['a.jpg', 'b.jpg', 'c.jpg']));
    expect(screen.queryByRole('listitem')).toBeNull();
  });

  it('shows how far a file is', async () => {
    const { choose } = show();
    await choose([photo('a.jpg')]);
    await waitFor(() => expect(FakeRequest.sent).toHaveLength(1));
    act(() => request('a.jpg').upload.onprogress?.({ lengthComputable: true, loaded: 1, total: 4 }));
    expect(screen.getByRole('progressbar', { name: 'a.jpg, 25% sent' })).toHaveAttribute('value', '0.25');
  });

  it('says which file was refused and why, and keeps the good ones', async () => {
    const { arrived, choose } = show();
    await choose([new File(['x'], 'notes.txt', { type: 'text/plain' }), photo('bad.jpg'), photo('good.jpg')]);
    expect(screen.getByText('Not a JPEG, PNG, WebP or PDF file')).toBeInTheDocument();
    await waitFor(() => expect(FakeRequest.sent).toHaveLength(2));
    request('bad.jpg').answer(201, {
      files: [],
      refused: [{ name: 'bad.jpg', code: 'unreadable', message: 'The picture is cut off' }],
    });
    request('good.jpg').answer(201, { files: [view('good.jpg')], refused: [] });
    expect(await screen.findByText('The picture is cut off')).toBeInTheDocument();
    await waitFor(() => expect(arrived.map((file) => file.name)).toEqual(['good.jpg']));
    expect(FakeRequest.sent.map((item) => item.name)).not.toContain('notes.txt');
    await userEvent.click(screen.getByRole('button', { name: 'Take bad.jpg off the list' }));
    expect(screen.queryByText('The picture is cut off')).toBeNull();
  });

  it('tries a file again under the same key after the line dropped', async () => {
    const { arrived, choose } = show();
    await choose([photo('a.jpg')]);
    await waitFor(() => expect(FakeRequest.sent).toHaveLength(1));
    const first = request('a.jpg');
    act(() => first.onerror?.());
    await userEvent.click(await screen.findByRole('button', { name: 'Try again' }));
    await waitFor(() => expect(FakeRequest.sent).toHaveLength(2));
    expect(request('a.jpg').headers['Idempotency-Key']).toBe(first.headers['Idempotency-Key']);
    request('a.jpg').answer(201, { files: [view('a.jpg')], refused: [] });
    await waitFor(() => expect(arrived).toHaveLength(1));
  });

  it('stops sending a file that is taken off the list', async () => {
    const { choose } = show();
    await choose([photo('a.jpg')]);
    await waitFor(() => expect(FakeRequest.sent).toHaveLength(1));
    await userEvent.click(screen.getByRole('button', { name: 'Take a.jpg off the list' }));
    expect(request('a.jpg').aborted).toBe(true);
    expect(screen.queryByRole('listitem')).toBeNull();
  });
});
