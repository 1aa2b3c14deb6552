import { useCallback, useEffect, useRef, useState } from 'react';
import { useBlocker } from 'react-router-dom';

/**
 * Saves before the page is left. Where that fails, the way on waits for the member's word; closing the window is warned
 * of by the browser.
 */
export function useLeaveGuard(isDirty: () => boolean, save: () => Promise<boolean>) {
  const [isAsking, setIsAsking] = useState(false);
  const blocker = useBlocker(
    useCallback(
      ({ currentLocation, nextLocation }) => currentLocation.pathname !== nextLocation.pathname && isDirty(),
      [isDirty],
    ),
  );
  const held = useRef(blocker);
  useEffect(() => {
    held.current = blocker;
  });
  const isHeld = blocker.state === 'blocked';
  useEffect(() => {
    if (!isHeld) return;
    let isCurrent = true;
    void save().then((isSaved) => {
      if (!isCurrent) return;
      if (isSaved) held.current.proceed?.();
      else setIsAsking(true);
    });
    return () => {
      isCurrent = false;
    };
  }, [isHeld, save]);
  useEffect(() => {
    const warn = (event: BeforeUnloadEvent) => {
      if (isDirty()) event.preventDefault();
    };
    window.addEventListener('beforeunload', warn);
    return () => window.removeEventListener('beforeunload', warn);
  }, [isDirty]);
  return {
    isAsking,
    leave: () => {
      setIsAsking(false);
      if (blocker.state === 'blocked') blocker.proceed();
    },
    stay: () => {
      setIsAsking(false);
      if (blocker.state === 'blocked') blocker.reset();
    },
  };
}
