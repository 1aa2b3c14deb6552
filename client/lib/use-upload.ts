import { useEffect, useRef, useState } from 'react';

type Sending = { signal: AbortSignal; onProgress: (share: number) => void };
type UploadOptions<Answer> = {
  send: (file: File, sending: Sending) => Promise<Answer>;
  bytesMax: number;
  /** What is said of a file with more bytes; it is not sent. */
  tooLarge: string;
  onTaken: (answer: Answer, file: File) => void;
};

/** Sends one file at once, with its progress; a refusal stays with its reason until another file is chosen. */
export function useUpload<Answer>({ send, bytesMax, tooLarge, onTaken }: UploadOptions<Answer>) {
  const [sending, setSending] = useState<{ name: string; share: number } | null>(null);
  const [refusal, setRefusal] = useState<string | null>(null);
  const stop = useRef<AbortController | null>(null);
  useEffect(() => () => stop.current?.abort(), []);
  const take = async (file: File) => {
    setRefusal(null);
    if (file.size > bytesMax) return setRefusal(`${file.name}: ${tooLarge}`);
    const controller = new AbortController();
    stop.current = controller;
    setSending({ name: file.name, share: 0 });
    try {
      const answer = await send(file, {
        signal: controller.signal,
        onProgress: (share) => setSending({ name: file.name, share }),
      });
      onTaken(answer, file);
    } catch (error) {
      if (controller.signal.aborted) return;
      setRefusal(`${file.name}: ${error instanceof Error ? error.message : 'it was not taken.'}`);
    }
    setSending(null);
  };
  return { sending, refusal, take };
}
