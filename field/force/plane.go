package force

import (
	"context"
	"errors"

	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/image"
)

// BeforePlane returns what a plane does to bound charge by the charge's own image: the full force and torque of the pair, half its
// energy, because the image follows the part. The part must be on the side of the normal; it may touch the plane.
//
// Settings.Stiffness is refused: that of On, with the image as the source, is for a part that moves before a fixed image.
//
// Source: [Jackson1999] section 2.2.
func BeforePlane(ctx context.Context, c *bound.Charge, plane image.Plane, s *Settings) (Result, error) {
	if c == nil {
		return Result{}, errors.New("force: charge is nil; give one")
	}
	if err := plane.Check(); err != nil {
		return Result{}, err
	}
	if s != nil && s.Stiffness {
		return Result{}, errors.New("force: stiffness before a plane is not computed; take differences of forces, or leave Stiffness out")
	}
	if err := before(c, &plane); err != nil {
		return Result{}, err
	}
	r, err := On(ctx, c, image.Image{Source: c, Plane: plane}, s)
	r.Energy, r.Error.Energy, r.Size.Energy = r.Energy/2, r.Error.Energy/2, r.Size.Energy/2
	return r, err
}
