import { QueryClientProvider } from '@tanstack/react-query';
import { useState, type ReactNode } from 'react';
import { queryClientOfPage } from './queryClient.ts';

/** Wraps every island that fetches; islands of one page share one cache. */
export function ClientProvider({ children }: { children: ReactNode }) {
  const [queryClient] = useState(queryClientOfPage);
  return <QueryClientProvider client={queryClient}>{children}</QueryClientProvider>;
}
