/** The part of `zipcodes` (BSD licence) that we use. */
declare module 'zipcodes' {
  interface ZipRecord {
    zip: string;
    latitude: number;
    longitude: number;
    city: string;
    state: string;
    country: string;
  }
  const zipcodes: { lookup(zip: string): ZipRecord | undefined };
  export default zipcodes;
}
