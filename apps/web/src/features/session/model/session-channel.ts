const name = 'masswright.session';

/** Tells the other tabs of this browser, which share the session's cookie, that it now stands for someone or something else. */
export function announceSessionChange(): void {
  const channel = new BroadcastChannel(name);
  channel.postMessage('changed');
  channel.close();
}

export function watchSessionChange(onChange: () => void): () => void {
  const channel = new BroadcastChannel(name);
  channel.onmessage = onChange;
  return () => channel.close();
}
