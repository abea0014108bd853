import { render } from '@testing-library/svelte';
import { describe, expect, it } from 'vitest';
import ProfileDrawing from '../../../../src/lib/components/profile/ProfileDrawing.svelte';
import { outside, overlap, boxAround } from '../../../../src/lib/components/profile/geometry';
import { drawFull } from '../../../../src/lib/components/profile/layout';
import { drawingWords } from '../../../../src/lib/components/profile/words';
import { findKind, profileKinds, shapeOf } from '../../../../src/lib/domain/profiles/kinds';

const shape = (kind: string) => shapeOf(findKind(kind)!);
const SHEET = { width: 420, height: 330, margin: { x: 104, y: 70 } };

describe('ProfileDrawing', () => {
	it('dimensions every leg, marks bends and hems, and names the finished side', () => {
		const { container } = render(ProfileDrawing, { shape: shape('drip edge'), units: 'imperial' });
		const words = [...container.querySelectorAll('text')].map((each) => each.textContent);
		expect(words).toEqual(
			expect.arrayContaining(['flange 3″', 'face 2″', 'kick 1/2″', 'hem 1/2″', '135°', 'finished'])
		);
		expect(container.querySelectorAll('circle')).toHaveLength(2);
	});

	it('says the profile in words for whoever does not see it', () => {
		const { getByRole } = render(ProfileDrawing, { shape: shape('drip edge'), units: 'imperial' });
		const label = getByRole('img').getAttribute('aria-label')!;
		expect(label).toBe(
			'Profile of 3 legs: flange 3 inches; bent 90° away from the finished side; face 2 inches; ' +
				'bent 45° toward the finished side; kick 1 half of an inch; ' +
				'closed hem of 1 half of an inch at the last edge.'
		);
	});

	it('is a wordless line as a thumbnail', () => {
		const props = { shape: shape('coping'), units: 'imperial', size: 'thumb' } as const;
		const { container } = render(ProfileDrawing, props);
		expect(container.querySelectorAll('text, circle')).toHaveLength(0);
		expect(container.querySelectorAll('path').length).toBeGreaterThan(1);
	});

	it('carries no inline style, which the content policy would refuse', () => {
		const { container } = render(ProfileDrawing, { shape: shape('sill'), units: 'metric' });
		expect(container.querySelectorAll('[style]')).toHaveLength(0);
		expect(container.textContent).toContain('mm');
	});

	it.each(profileKinds.map(({ kind }) => kind))(
		'keeps every dimension of a %s on the sheet and off the others',
		(kind) => {
			const { dimensions } = drawFull(shape(kind), SHEET, drawingWords('imperial'));
			const boxes = dimensions.map(({ label }) => boxAround(label.at, label.text.length * 8.4, 17));
			expect(boxes).toHaveLength(shape(kind).legs.length);
			for (const [i, box] of boxes.entries()) {
				expect(outside(box, SHEET.width, SHEET.height)).toBe(0);
				expect(boxes.slice(i + 1).some((other) => overlap(box, other))).toBe(false);
			}
		}
	);

	it('draws at the true angle: a square fascia has square corners', () => {
		const { points } = drawFull(shape('fascia'), SHEET, drawingWords('imperial'));
		const [a, b, c] = points as [{ x: number; y: number }, { x: number; y: number }, { x: number; y: number }]; // prettier-ignore
		expect((b.x - a.x) * (c.x - b.x) + (b.y - a.y) * (c.y - b.y)).toBeCloseTo(0, 6);
	});
});
