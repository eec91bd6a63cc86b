import { writePoints, type Picture, type Shape } from '@masswright/pictures';

function ShapeView({ shape }: { shape: Shape }) {
  switch (shape.kind) {
    case 'rectangle':
      return (
        <rect
          x={shape.x}
          y={shape.y}
          width={shape.width}
          height={shape.height}
          fillOpacity={shape.fillOpacity}
          strokeWidth={shape.strokeWidth}
          className={`${shape.fill ? `fill-${shape.fill}` : 'fill-none'} ${shape.stroke ? `stroke-${shape.stroke}` : ''}`}
        />
      );
    case 'line':
      return (
        <line
          x1={shape.from[0]}
          y1={shape.from[1]}
          x2={shape.to[0]}
          y2={shape.to[1]}
          strokeWidth={shape.strokeWidth}
          strokeDasharray={shape.dash?.join(' ')}
          className={`stroke-${shape.stroke}`}
        />
      );
    case 'polygon':
      return <polygon points={writePoints(shape.points)} className={`fill-${shape.fill} ${shape.outline ? `stroke-${shape.outline}` : ''}`} />;
    case 'text':
      return (
        <text
          x={shape.at[0]}
          y={shape.at[1]}
          textAnchor={shape.anchor}
          fontSize={shape.size}
          className={`fill-${shape.fill} picture-${shape.face}${shape.bold ? ' picture-bold' : ''}`}
        >
          {shape.text}
        </text>
      );
  }
}

/** A picture of ours on the screen, in the theme's colours. Without words it is an ornament of the numbers beside it. */
export function PictureView({ picture, className }: { picture: Picture; className?: string }) {
  const spoken = picture.alternative !== '';
  return (
    <svg
      className={`picture ${className ?? ''}`}
      viewBox={`0 0 ${picture.width} ${picture.height}`}
      width={picture.width}
      height={picture.height}
      role={spoken ? 'img' : undefined}
      aria-label={spoken ? picture.alternative : undefined}
      aria-hidden={spoken ? undefined : true}
      focusable="false"
    >
      {picture.shapes.map((shape, index) => (
        <ShapeView key={index} shape={shape} />
      ))}
    </svg>
  );
}
