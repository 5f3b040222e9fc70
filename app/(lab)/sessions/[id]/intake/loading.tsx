import { LoadingSheet } from '@/components/shell/loading-sheet';

export default function Loading() {
  return <LoadingSheet titles={['Arrays found', 'Lengths matched', 'First trials']} />;
}
