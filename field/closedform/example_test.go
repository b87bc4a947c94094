package closedform_test

import (
	"fmt"

	"example.com/boundpole/field/closedform"
)

// A disc magnet of 8 mm diameter and 3 mm height with Br = 1.30 T: the flux density on
// its axis 2.5 mm above the face, and its working point for a recoil permeability of 1.05.
func Example() {
	const br, radius, height = 1.30, 4.0, 3.0
	b := closedform.CylinderAxisInduction(br, radius, height, height/2+2.5)
	n := closedform.CylinderMagnetometricFactor(radius, height)
	working, _ := closedform.OperatingPoint(br, n, 1.05)
	fmt.Printf("B = %.3f mT, N = %.5f, working B = %.4f T\n", 1e3*b, n, working)
	// Output: B = 181.179 mT, N = 0.54340, working B = 0.5779 T
}
