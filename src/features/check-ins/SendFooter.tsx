import { Send } from 'lucide-react';
import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { Button } from '#src/components/Button.tsx';

type Props = {
  onSend: () => void;
  sending: boolean;
  /** Why it could not be sent, where it could not. */
  failure: ReactNode;
};

/** The last press of a check-in, and what stood in its way. */
export function SendFooter({ onSend, sending, failure }: Props) {
  const { t } = useTranslation('check-in-screens');
  return (
    <>
      {/* The region stands from the start, or what arrives in it is not announced. */}
      <div role="alert" className="empty:hidden">
        {failure}
      </div>
      <Button size="large" block icon={Send} busy={sending} onClick={onSend}>
        {t('review.send')}
      </Button>
    </>
  );
}
