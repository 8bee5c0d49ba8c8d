import { oilScene, type SceneRequest, soapScene } from './benchScenes.ts';
import { harbourScene } from './harbourScene.ts';
import type { Scene } from './types.ts';

/** The scenes that the validation reads, by name. */
export const SCENES = {
  'soap-draining': (request: SceneRequest): Scene => soapScene(request, false),
  'soap-black-film': (request: SceneRequest): Scene => soapScene(request, true),
  'oil-sheen': (request: SceneRequest): Scene => oilScene(request, 'sheen'),
  'oil-lens': (request: SceneRequest): Scene => oilScene(request, 'lens'),
  /** Upright: the request's longer side is its height. */
  'oil-harbour': (request: SceneRequest) =>
    harbourScene({
      ...request,
      width: Math.min(request.width, request.height),
      height: Math.max(request.width, request.height),
      skyUnevenness: 0,
      glint: true,
      subsamples: 2,
      rippleWaves: 16,
    }),
} as const;
export type SceneName = keyof typeof SCENES;

export const SCENE_NAMES = Object.keys(SCENES) as readonly SceneName[];
