import { Sheet } from '@/components/layout/sheet';
import { SkeletonText } from '@/components/ui/skeleton';

/** A cohort that is on its way. */
export default function Loading() {
  return (
    <Sheet margin={<SkeletonText lines={4} />}>
      <SkeletonText lines={2} />
      <div className="my-6 border border-line bg-stone px-5.5 py-4.5">
        <SkeletonText lines={3} />
      </div>
      <SkeletonText lines={6} />
    </Sheet>
  );
}
