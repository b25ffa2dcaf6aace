import { afterEach, beforeEach, expect, it, vi } from "vitest";
import { spaced } from "../../client/src/spaced.ts";

beforeEach(() => void vi.useFakeTimers());
afterEach(() => void vi.useRealTimers());

it("does at once what is called for after a rest, and once more for all that came too soon", () => {
  const work = vi.fn();
  const { run } = spaced(work, 100);
  run();
  expect(work).toHaveBeenCalledTimes(1);
  vi.advanceTimersByTime(50);
  run();
  run();
  expect(work).toHaveBeenCalledTimes(1);
  vi.advanceTimersByTime(50);
  expect(work).toHaveBeenCalledTimes(2);
  vi.advanceTimersByTime(99);
  run();
  expect(work).toHaveBeenCalledTimes(2);
  vi.advanceTimersByTime(1);
  expect(work).toHaveBeenCalledTimes(3);
  vi.advanceTimersByTime(500);
  run();
  expect(work).toHaveBeenCalledTimes(4);
});

it("does nothing any more once it is disposed of", () => {
  const work = vi.fn();
  const { run, dispose } = spaced(work, 100);
  run();
  run();
  dispose();
  vi.advanceTimersByTime(500);
  expect(work).toHaveBeenCalledTimes(1);
});

it("does it once more after a quiet while, for what may have missed the last time", () => {
  const work = vi.fn();
  const { run, dispose } = spaced(work, 100, 400);
  run();
  vi.advanceTimersByTime(50);
  run();
  vi.advanceTimersByTime(50);
  expect(work).toHaveBeenCalledTimes(2);
  vi.advanceTimersByTime(399);
  expect(work).toHaveBeenCalledTimes(2);
  vi.advanceTimersByTime(1);
  expect(work).toHaveBeenCalledTimes(3);
  vi.advanceTimersByTime(5000);
  expect(work).toHaveBeenCalledTimes(3);
  run();
  dispose();
  vi.advanceTimersByTime(5000);
  expect(work).toHaveBeenCalledTimes(4);
});
