import { RoomSkeleton } from './_components/room-skeleton';

/** The room's shape until it is there. Without JavaScript nothing swaps the two, so the style sheet shows the room. */
export default function Loading() {
  return (
    <>
      <noscript>
        {/* Never among the styles of a page with JavaScript. */}
        {/* eslint-disable-next-line @next/next/no-css-tags */}
        <link rel="stylesheet" href="/no-script.css" />
      </noscript>
      <div data-until-script className="mx-auto w-full max-w-page px-4 pt-22 pb-16 sm:px-6 lg:px-7">
        <RoomSkeleton />
      </div>
    </>
  );
}
