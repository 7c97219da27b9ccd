import { headers } from 'next/headers';
import { notFound, redirect } from 'next/navigation';
import type { Person, StudioContext, WorkspaceContext } from '@/lib/auth/context';
import { enterStudio, enterWorkspace } from '@/lib/auth/enter';
import { currentPerson } from '@/lib/auth/session';
import { AppError } from '@/lib/errors/app-error';

/** Who reads the page; nobody signed in is sent to sign in and comes back to where they were. */
export async function enterDesk(): Promise<Person> {
  const person = await currentPerson();
  if (person) return person;
  const path = (await headers()).get('x-firstpull-path') ?? '/today';
  redirect(`/sign-in?next=${encodeURIComponent(path)}`);
}

const nowhere = ['not_found', 'forbidden', 'invalid'];

/** There is no page for what is missing, closed, or asked for by an address that means nothing; else the error page. */
export async function orNotFound<T>(work: Promise<T>): Promise<T> {
  try {
    return await work;
  } catch (error) {
    if (error instanceof AppError && nowhere.includes(error.code)) notFound();
    throw error;
  }
}

export async function enterWorkspacePage(workspace: string): Promise<WorkspaceContext> {
  return orNotFound(enterWorkspace(await enterDesk(), workspace));
}

export async function enterStudioPage(studio: string): Promise<StudioContext> {
  return orNotFound(enterStudio(await enterDesk(), studio));
}
