/** Whether a web address answers at all; `accept` tells which status counts (any below 500 by default). */
export async function webAnswers(url: string, accept = (status: number) => status < 500): Promise<boolean> {
  const response = await fetch(url, { signal: AbortSignal.timeout(5000), redirect: 'manual' });
  await response.body?.cancel();
  return accept(response.status);
}
