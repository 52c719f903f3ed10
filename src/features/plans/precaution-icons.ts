import {
  ArrowUp,
  ArrowUpToLine,
  Car,
  CarFront,
  Dumbbell,
  Eye,
  Hand,
  HandHelping,
  MoonStar,
  RotateCcw,
  RotateCw,
  Shield,
  Shirt,
  ShoppingBag,
  Waves,
} from 'lucide-react';
import type { LucideIcon } from 'lucide-react';

/** The drawings that a plan may name. Listed one by one, so that the rest of the set is not loaded. */
const icons: Record<string, LucideIcon> = {
  'arrow-up': ArrowUp,
  'arrow-up-to-line': ArrowUpToLine,
  car: Car,
  'car-front': CarFront,
  dumbbell: Dumbbell,
  eye: Eye,
  hand: Hand,
  'hand-helping': HandHelping,
  'moon-star': MoonStar,
  'rotate-ccw': RotateCcw,
  'rotate-cw': RotateCw,
  shirt: Shirt,
  'shopping-bag': ShoppingBag,
  waves: Waves,
};

/** A shield where a plan names a drawing that is not there. */
export const precautionIcon = (name: string): LucideIcon => icons[name] ?? Shield;
