import clsx from 'clsx';
import type { StageProps } from './stage-props';

/** One frame and one height for the stage in every state, so that nothing jumps when the model arrives. */
export const STAGE_FRAME = 'relative flex flex-col border border-rule bg-sheet';
export const STAGE_HEIGHT = 'h-[min(78vw,32rem)] min-h-72';

type PictureProps = Pick<StageProps, 'pictureUrl' | 'title' | 'className'>;

/** The still picture in the stage's frame, while the 3D code is on its way. */
export function StagePicture({ className, ...picture }: PictureProps) {
  return (
    <div className={clsx(STAGE_FRAME, className)}>
      <div className="h-11" />
      <div className={STAGE_HEIGHT}>
        <Picture {...picture} />
      </div>
      <p className="px-4 pb-3 text-xs text-slate">The model is on its way.</p>
    </div>
  );
}

export function Picture({ pictureUrl, title }: Omit<PictureProps, 'className'>) {
  return (
    // Already the right size, and it comes from the store by a signed address.
    // eslint-disable-next-line @next/next/no-img-element
    <img
      src={pictureUrl}
      alt={`${title}, seen from the front right`}
      className="size-full object-contain mix-blend-multiply dark:opacity-80 dark:mix-blend-normal"
    />
  );
}
