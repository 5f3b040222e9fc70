import { LoadingSheet } from '@/components/shell/loading-sheet';

export default function Loading() {
  return <LoadingSheet titles={['Sessions', 'Animals']} />;
}
