import type { ReactNode } from 'react';

/** The margins of a clinic page that is one column; `narrow` where it is read or filled in line by line. */
export function PagePane({ narrow = false, children }: { narrow?: boolean; children: ReactNode }) {
  return (
    <div
      className={`grid content-start gap-6 px-5 py-5 @4xl/clinic:px-8 ${narrow ? 'max-w-4xl' : 'max-w-[90rem]'}`}
    >
      {children}
    </div>
  );
}
