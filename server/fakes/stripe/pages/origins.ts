/** Origins of addresses, for the page's policy; what is no address is left out. */
export function originsOf(...addresses: (string | null | undefined)[]): string[] {
  return addresses.flatMap((address) => {
    try {
      return address ? [new URL(address).origin] : [];
    } catch {
      return [];
    }
  });
}
