import { RoomSkeleton } from './_components/room-skeleton';

export default function Loading() {
  return (
    <main id="main" className="mx-auto w-full max-w-page px-4 pt-16 pb-16 sm:px-6 lg:px-7">
      <RoomSkeleton />
    </main>
  );
}
