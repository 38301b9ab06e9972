import { useEffect } from 'react';

const product = 'Stepwell';

/** Names the place in the browser's tab for as long as it is shown. */
export function useTitle(title: string): void {
  useEffect(() => {
    document.title = `${title} · ${product}`;
    return () => {
      document.title = product;
    };
  }, [title]);
}
