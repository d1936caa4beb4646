import { type Attributes, figureFault, readNumber } from './read-style';

/** Path data hold these letters, numbers and their separators. */
const pathGrammar = /^[MmLlHhVvCcSsQqTtAaZz0-9eE+\-.,\s]*$/;

/** Path data of a shape element. */
export function pathOf(name: string, attributes: Attributes): string | undefined {
  const at = (key: string, otherwise = 0) => readNumber(attributes, key, otherwise);
  switch (name) {
    case 'path': {
      const data = attributes.d ?? '';
      if (!pathGrammar.test(data)) throw figureFault('path', data, 'path data');
      return data;
    }
    case 'line':
      return `M${at('x1')},${at('y1')}L${at('x2')},${at('y2')}`;
    case 'rect': {
      const [x, y, width, height] = [at('x'), at('y'), at('width'), at('height')];
      const radius = Math.min(at('rx', at('ry')), width / 2, height / 2);
      if (width <= 0 || height <= 0) return undefined;
      if (!(radius > 0)) return `M${x},${y}h${width}v${height}h${-width}Z`;
      const arc = (dx: number, dy: number) => `a${radius},${radius} 0 0 1 ${dx},${dy}`;
      const [across, down] = [width - 2 * radius, height - 2 * radius];
      return `M${x + radius},${y}h${across}${arc(radius, radius)}v${down}${arc(-radius, radius)}h${-across}${arc(-radius, -radius)}v${-down}${arc(radius, -radius)}Z`;
    }
    case 'circle':
      return ellipse(at('cx'), at('cy'), at('r'), at('r'));
    case 'ellipse':
      return ellipse(at('cx'), at('cy'), at('rx'), at('ry'));
    case 'polyline':
    case 'polygon': {
      const points = attributes.points ?? '';
      if (!pathGrammar.test(points)) throw figureFault('points', points, 'numbers');
      return `M${points.trim()}${name === 'polygon' ? 'Z' : ''}`;
    }
    default:
      throw figureFault('element', name, 'a mark of a chart');
  }
}

/** Two half circles: an arc cannot end where it starts. */
function ellipse(cx: number, cy: number, rx: number, ry: number): string | undefined {
  if (rx <= 0 || ry <= 0) return undefined;
  return `M${cx - rx},${cy}a${rx},${ry} 0 1 1 ${2 * rx},0a${rx},${ry} 0 1 1 ${-2 * rx},0Z`;
}
