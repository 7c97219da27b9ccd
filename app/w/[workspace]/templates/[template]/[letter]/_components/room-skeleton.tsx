import { SkeletonBlock, Skeleton } from '@/app/_components/skeleton';

/** The room's shape while it is on its way. */
export function RoomSkeleton() {
  return (
    <div className="flex flex-col gap-4">
      <SkeletonBlock className="h-36 border border-ink" label="The revision is on its way" />
      <div className="grid gap-6 lg:grid-cols-[minmax(0,1fr)_minmax(20rem,27rem)]">
        <SkeletonBlock className="h-[34rem]" label="The model is on its way" />
        <Skeleton lines={12} label="The docket is on its way" />
      </div>
    </div>
  );
}
