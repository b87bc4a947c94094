// Package logatan holds the natural logarithm of a ratio and the arctangent
// of a ratio, written so that vector code can follow them bit for bit.
//
// Each function is one straight line of additions, products, math.FMA and a
// single division on its usual path; selections are made by comparing and
// adding bit patterns of float64 and by choosing one of eight constants and a
// sign, no larger table is read, and rare arguments (zero, infinite, NaN, very large or
// very small) leave the line at one test. No product is followed by a sum
// outside math.FMA, so the bits do not depend on the architecture or on
// GOAMD64.
//
// The slice forms LogRatioTo, Log1pRatioTo and Atan2To call the scalar forms
// element by element and so return the same bits. They allow dst to be one of
// the arguments, allocate nothing and panic when the lengths differ.
//
// Errors are given in units in the last place (ulp) of the correctly rounded
// result, as the tests measure them against 128-bit arithmetic.
package logatan
