import type { WorkspaceContext } from '@/lib/auth/context';
import { conflict, forbidden } from '@/lib/errors/app-error';
import type { UploadRow } from './upload-data';

/** Only the person who began a file sends it on, ends it or cancels it. */
export function requireSender(ctx: WorkspaceContext, upload: UploadRow): void {
  if (upload.createdBy !== ctx.person.id)
    throw forbidden('Somebody else is sending this file. Send your own to replace it.', 'not-your-upload');
}

const words: Record<Exclude<UploadRow['state'], 'sending'>, string> = {
  reading: 'This file is complete and being read.',
  ready: 'This file is complete and was read.',
  refused: 'This file was refused. Send another one.',
  cancelled: 'This file was cancelled. Send it anew.',
};

/** Only a file that is still on its way takes parts. */
export function requireSending(ctx: WorkspaceContext, upload: UploadRow): void {
  requireSender(ctx, upload);
  if (upload.state !== 'sending') throw conflict('upload-not-sending', words[upload.state]);
}
