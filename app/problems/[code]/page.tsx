import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { MessageSheet } from '@/components/shell/message-sheet';
import { errorCodes, type ErrorCode } from '@/lib/errors/app-error';
import { problemHelp } from './problem-help';

interface Props {
  params: Promise<{ code: string }>;
}

async function codeOf({ params }: Props): Promise<ErrorCode> {
  const { code } = await params;
  if (!Object.hasOwn(errorCodes, code)) notFound();
  return code as ErrorCode;
}

export async function generateMetadata(props: Props): Promise<Metadata> {
  return { title: errorCodes[await codeOf(props)].title };
}

/** What the `type` of a problem+json answer leads to: what the code means and what to do. */
export default async function ProblemPage(props: Props) {
  const code = await codeOf(props);
  const { meaning, steps } = problemHelp[code];
  return (
    <MessageSheet title={errorCodes[code].title} side={`${errorCodes[code].status} ${code}`}>
      <p>{meaning}</p>
      <ul>
        {steps.map((step) => (
          <li key={step}>{step}</li>
        ))}
      </ul>
    </MessageSheet>
  );
}
