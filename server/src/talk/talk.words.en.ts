/** The e-mail about messages not seen. It names who wrote about what and leaves the words where they are. */
export const messageWaitingWords = {
  subject: ({ company, title }: { company: string; title: string }) => `${company} wrote about ${title}`,
  subjectOfMany: (threads: number) => `Messages wait in ${threads} threads`,
  line: ({ company, title, count }: { company: string; title: string; count: number }) =>
    `${company}, about ${title}: ${count === 1 ? 'one message' : `${count} messages`} not seen yet.`,
  open: 'Read and answer',
  openAll: 'See all threads',
} as const;
