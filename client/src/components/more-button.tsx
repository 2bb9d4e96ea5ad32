import { Button } from '@radix-ui/themes';
import type { ReactNode } from 'react';

/** What of a list read by key this needs. */
interface MoreToRead {
  hasNextPage: boolean;
  isFetchingNextPage: boolean;
  fetchNextPage: () => Promise<unknown>;
}

/** Reads the next page of a list; nothing where the list is at its end. */
export function MoreButton({ list, children }: { list: MoreToRead; children: ReactNode }) {
  if (!list.hasNextPage) return null;
  return (
    <Button
      variant="soft"
      size="3"
      loading={list.isFetchingNextPage}
      onClick={() => void list.fetchNextPage()}
    >
      {children}
    </Button>
  );
}
