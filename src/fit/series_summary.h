// SPDX-License-Identifier: Apache-2.0
// Published relations between series of whorls, angles and the whorl expansion.
#pragma once

#include "fit/fit.h"

namespace whorl::fit {

/// Angle between the spiral and its radius in the plane, degrees: tan alpha = 2 pi / ln W (Moseley 1838, Philosophical
/// Transactions 128: 351-370; Thompson 1917, On Growth and Form, p. 534).
double spiral_angle(double W);
/// The same on a cone, tan alpha = 2 pi sin(semi-angle) / ln W (Thompson 1917, p. 557).
double spiral_angle_on_cone(double W, double semi_angle_deg);
/// Moseley's grouped readings: the sum of `whorls` successive widths, and of the smaller half of them (Thompson 1917, p. 520).
double W_from_sums(double long_sum, double short_sum, int whorls);
/// For a regular spire: apical angle over the sutures, and sutural angle at the upper crossing of a suture in side view.
/// Its crossings lie at apex distances L and L / sqrt(W), so W = (sin sigma / sin(sigma + A))^2.
double W_from_sutural_angle(double sutural_deg, double apical_deg);

/// Natural irregularity of a series from whorl to whorl, as a fraction of the values: the spread of ln value about a straight line
/// or a parabola in growth, whichever has the smaller corrected AIC, less what the reading error explains. Of the series alone, so
/// that a contradiction with other readings is not taken for irregularity.
double own_scatter(const specimen::Series& series, double reading_error);

/// All but the scatter.
SeriesResult summary_of(const specimen::Series& series);

}  // namespace whorl::fit
