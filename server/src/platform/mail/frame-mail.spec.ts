import { frameMail } from './frame-mail.ts';

const frame = { name: 'Ida Brandt', appUrl: 'https://app.example' };

describe('the frame of an e-mail', () => {
  it('says the same in text and HTML, with a whole address', () => {
    const mail = frameMail(
      {
        subject: 'Bid in',
        lines: ['One bid came in.'],
        action: { label: 'Look', path: '/scopes/1?tab=bids' },
      },
      frame,
    );
    for (const body of [mail.text, mail.html]) {
      expect(body).toContain('Hello Ida Brandt,');
      expect(body).toContain('One bid came in.');
      expect(body).toContain('https://app.example/scopes/1?tab=bids');
    }
  });

  it('lets nothing typed become markup or a header', () => {
    const mail = frameMail(
      { subject: 'Wall\r\nBcc: all@example.com', lines: ['<img src=x onerror=alert(1)> & "so"'] },
      { ...frame, name: 'A\nB <script>' },
    );
    expect(mail.subject).toBe('Wall Bcc: all@example.com');
    expect(mail.html).not.toMatch(/<img|<script/);
    expect(mail.html).toContain('&lt;img src=x onerror=alert(1)&gt; &amp; &quot;so&quot;');
  });

  it.each(['//evil.example', 'https://evil.example', '/\\evil.example', 'x'])(
    'refuses a link to %s',
    (path) => {
      expect(() => frameMail({ subject: 's', lines: [], action: { label: 'l', path } }, frame)).toThrow();
    },
  );
});
