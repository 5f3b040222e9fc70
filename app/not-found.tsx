import Link from 'next/link';
import { MessageSheet } from '@/components/shell/message-sheet';

export const metadata = { title: 'Nothing here' };

export default function NotFound() {
  return (
    <MessageSheet
      title="There is nothing here"
      side="404"
      acts={
        <Link className="btn" href="/">
          To the lab’s studies
        </Link>
      }
    >
      <p>
        The address may be mistyped, or it belongs to a study that your lab cannot see. Nothing was changed.
      </p>
    </MessageSheet>
  );
}
