/** What a person reads beside a file that was not taken. */
export const refusalWords = {
  tooLarge: 'Larger than 25 MB. Send a smaller copy.',
  tooMany: 'Ten files at a time. Send this one again with the next.',
  notAccepted: 'Only JPEG, PNG and WebP pictures and PDF drawings are taken.',
  extension: 'The name says one kind of file and the content another. Save it again as what it is.',
  photoOnly: 'A photo must be a JPEG, PNG or WebP picture.',
  empty: 'The file is empty.',
  picture: 'The picture is damaged or cut off. Take or save it again.',
  pixels: 'More than 50 megapixels. Save it smaller.',
  pdf: 'The PDF is damaged or cut off. Save or print it to PDF again.',
  encrypted: 'The PDF is protected by a password. Save it without one.',
  pages: 'More than 200 pages. Send the sheets that matter.',
  active: 'The PDF carries scripts, forms or other files inside. Print it to PDF and send that.',
  noRoom: 'Your company’s space for files is used up.',
} as const;
