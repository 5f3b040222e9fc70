import { Children, cloneElement, Fragment, isValidElement, type ReactElement, type ReactNode } from 'react';
import { splitNumbers } from '@/lib/format/split-numbers';

const settledTags = new Set([
  'code',
  'time',
  'svg',
  'kbd',
  'textarea',
  'option',
  'script',
  'style',
  'select',
]);

function isSettled(element: ReactElement<{ className?: string }>): boolean {
  if (typeof element.type === 'string' && settledTags.has(element.type)) return true;
  return /(?:^|\s)(?:n|u|on)(?:\s|$)/.test(element.props.className ?? '');
}

/**
 * Sets every number inside words in the mono face: numbers('held-out R² is 0.45 [0.40, 0.50]').
 * Takes a string or JSX and looks into plain elements; what a component renders itself is left alone,
 * and so is what already stands in mono (code, time, class n).
 */
export function numbers(node: ReactNode): ReactNode {
  if (typeof node === 'number') return <span className="n">{node}</span>;
  if (typeof node === 'string') {
    const pieces = splitNumbers(node);
    if (pieces.every((piece) => !piece.isNumber)) return pieces.map((piece) => piece.text).join('');
    return pieces.map((piece, index) =>
      piece.isNumber ? (
        <span key={index} className="n">
          {piece.text}
        </span>
      ) : (
        <Fragment key={index}>{piece.text}</Fragment>
      ),
    );
  }
  if (Array.isArray(node)) return Children.map(node, (child) => <Fragment>{numbers(child)}</Fragment>);
  if (isValidElement<{ className?: string; children?: ReactNode }>(node)) {
    const isPlain = typeof node.type === 'string' || node.type === Fragment;
    if (!isPlain || isSettled(node) || node.props.children === undefined) return node;
    return cloneElement(node, undefined, numbers(node.props.children));
  }
  return node;
}
