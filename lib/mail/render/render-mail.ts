import type { MailRequest } from '../messages';
import type { MailContent } from './content';
import { invitation, resetPassword, secondFactor, verifyAddress } from './identity';
import {
  gateDue,
  gateShort,
  gateWaits,
  notePosted,
  revisionRecalled,
  revisionReleased,
  revisionRetired,
  revisionReturned,
  revisionSigned,
} from './revision';
import { checkFails, checkGivenUp, revisionChecked, revisionPosted, revisionWithdrawn } from './posting';
import { standInNamed } from './stand-in';
import { toHtml } from './to-html';
import { toText } from './to-text';

export type RenderedMail = { subject: string; text: string; html: string };

/** Text and HTML of a mail. `origin` is our own address; every link leads there and changes nothing by itself. */
export function renderMail(request: MailRequest, origin: string): RenderedMail {
  const content = contentOf(request, origin);
  return { subject: content.subject, text: toText(content), html: toHtml(content) };
}

function contentOf(request: MailRequest, origin: string): MailContent {
  const url = 'path' in request ? ownLink(request.path, origin) : '';
  switch (request.template) {
    case 'verify-address':
      return verifyAddress({ ...request, url: ownLink(request.url, origin) });
    case 'reset-password':
      return resetPassword({ ...request, url: ownLink(request.url, origin) });
    case 'second-factor':
      return secondFactor(request, ownLink('/account', origin));
    case 'invitation':
      return invitation(request, url);
    case 'revision-posted':
      return revisionPosted(request, url);
    case 'revision-checked':
      return revisionChecked(request, url);
    case 'check-fails':
      return checkFails(request, url);
    case 'check-given-up':
      return checkGivenUp(request, url);
    case 'revision-withdrawn':
      return revisionWithdrawn(request, url);
    case 'gate-waits':
      return gateWaits(request, url);
    case 'gate-due':
      return gateDue(request, url);
    case 'gate-short':
      return gateShort(request, url);
    case 'stand-in-named':
      return standInNamed(request, url);
    case 'note-posted':
      return notePosted(request, url);
    case 'revision-signed':
      return revisionSigned(request, url);
    case 'revision-returned':
      return revisionReturned(request, url);
    case 'revision-released':
      return revisionReleased(request, url);
    case 'revision-recalled':
      return revisionRecalled(request, url);
    case 'revision-retired':
      return revisionRetired(request, url);
  }
}

/** An absolute link on our own host; a path that would leave it (`//elsewhere`) is a fault of ours. */
function ownLink(path: string, origin: string): string {
  const url = new URL(path, origin);
  if (url.origin !== new URL(origin).origin) throw new TypeError('a mail may only link to our own host');
  return url.href;
}
