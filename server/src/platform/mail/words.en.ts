/** The frame around every e-mail. What each one says lies with its feature. */
export const mailFrameWords = {
  greeting: (name: string) => `Hello ${name},`,
  footer:
    'You get this because you work with Kerfyard for your company. Answers to this address are not read.',
  openHint: 'If the button does nothing, open this address:',
} as const;
