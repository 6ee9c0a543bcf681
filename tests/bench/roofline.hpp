// A yardstick that doesn't change: what this machine needs for plain polynomial work of the size of a
// pooling.
#pragma once

/// Degree-20 Horner at 4,096 nodes for each of `studies` coefficient sets, added up per node; compiled for
/// the same instruction sets as the inner kernels. Returns the sum over nodes.
double roofline(int studies);
