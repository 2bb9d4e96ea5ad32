import { isGuessable } from './guessable-password.ts';

const own = ['Ada Quill', 'ada.quill@northpier.example', 'North Pier Cutting'];

describe('D-08 passwords that are tried first', () => {
  it.each([
    'password1234',
    'Passw0rd!2026',
    'p@ssw0rdp@ssw0rd',
    'qwertyuiop123',
    '123456789012',
    'abcdefabcdef',
    'aaaaaaaaaaaaaaaa',
    'abababababab',
    'letmeinletmein',
    'Welcome2026!!',
    'kerfyardkerfyard',
    'northpier2026!',
    'AdaQuill123456',
    '1qaz2wsx3edc',
    'concretecutting1',
    'password8273',
  ])('refuses %s', (password) => {
    expect(isGuessable(password, own)).toBe(true);
  });

  it.each([
    'a kettle on the ninth stair',
    'tr0mbone-Lagoon-fern',
    'vermietung über dächern',
    'correct horse battery staple',
    '木漏れ日とさざ波の音を聴く',
    'x7#Qm2vLp9!dRk4w',
    '8273-9182-4471-0263',
    'thirteen blue wheelbarrows ',
  ])('takes %s', (password) => {
    expect(isGuessable(password, own)).toBe(false);
  });
});
