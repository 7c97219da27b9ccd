'use client';

import { useCallback, useState, type RefObject } from 'react';
import type { StageModelMeta } from '@/lib/stage-model/stage-model-meta';
import type { StageModelData } from './decode-stage-model';
import { attachPointers, type PointerEvents } from './pointer-control';
import { StageControl } from './stage-control';
import { StageScene } from './stage-scene';
import { SurfacePicker } from './surface-picker';
import type { StageCamera } from './stage-props';
import { useStageModel } from './use-stage-model';

export interface StageEngine {
  scene: StageScene;
  control: StageControl;
  picker: SurfacePicker;
  model: StageModelData;
}

export interface EngineHandlers extends PointerEvents {
  onRest(view: StageCamera): void;
}

/**
 * Model, scene and camera of one stage. `host` is a ref for the element that the canvas goes into; `redraw` starts the
 * scene anew after its context was lost. Everything is disposed when the model changes or the stage goes.
 */
export function useStageEngine(modelUrl: string, meta: StageModelMeta, handlers: RefObject<EngineHandlers>) {
  const [engine, setEngine] = useState<StageEngine | null>(null);
  const [drawProblem, setDrawProblem] = useState<string | null>(null);
  const [lost, setLost] = useState(false);
  const [turn, setTurn] = useState(0);

  const { model, problem } = useStageModel(modelUrl, turn);
  const { min, max } = meta.boundsMm;
  const boundsKey = [...min, ...max].join();

  const host = useCallback(
    (element: HTMLDivElement | null) => {
      if (!element || !model) return undefined;
      const canvas = document.createElement('canvas');
      canvas.className = 'absolute inset-0 size-full';
      canvas.setAttribute('aria-hidden', 'true');
      element.prepend(canvas);
      let scene: StageScene;
      try {
        scene = new StageScene(canvas, model);
      } catch {
        canvas.remove();
        const text =
          'This browser gave no WebGL for the model. The picture and the figures come from the same check.';
        setDrawProblem(text);
        return undefined;
      }
      const numbers = boundsKey.split(',').map(Number) as number[];
      const bounds = {
        min: numbers.slice(0, 3) as [number, number, number],
        max: numbers.slice(3) as [number, number, number],
      };
      const picker = new SurfacePicker(model);
      const control = new StageControl(scene, picker, bounds, (view) => handlers.current?.onRest(view));
      // The focus lies on the element around the canvas; wheel and touch depend on who has it.
      const holder = element.closest<HTMLElement>('[tabindex]') ?? element;
      const detach = attachPointers(holder, control, {
        onHover: (place) => handlers.current?.onHover(place),
        onPress: (place) => handlers.current?.onPress(place),
      });
      const onLost = (event: Event) => {
        event.preventDefault();
        setLost(true);
      };
      const onRestored = () => {
        setLost(false);
        control.invalidate();
      };
      canvas.addEventListener('webglcontextlost', onLost);
      canvas.addEventListener('webglcontextrestored', onRestored);
      const size = new ResizeObserver(([entry]) => {
        const { width, height } = entry.contentRect;
        if (width > 0 && height > 0) control.resize(width, height);
      });
      size.observe(element);
      setLost(false);
      setEngine({ scene, control, picker, model });
      return () => {
        size.disconnect();
        detach();
        canvas.removeEventListener('webglcontextlost', onLost);
        canvas.removeEventListener('webglcontextrestored', onRestored);
        control.dispose();
        scene.dispose();
        canvas.remove();
        setEngine(null);
      };
    },
    // `turn` makes a new ref, and with it a new scene.
    // eslint-disable-next-line react-hooks/exhaustive-deps
    [model, boundsKey, handlers, turn],
  );

  const redraw = useCallback(() => {
    setDrawProblem(null);
    setTurn((n) => n + 1);
  }, []);

  return { host, engine, problem: problem ?? drawProblem, lost, redraw };
}
