// SPDX-License-Identifier: Apache-2.0
// Traced outlines: distances, and shells found from silhouettes of the solid.
#include "support/catch.h"

#include "fit/fit.h"
#include "fit/outline_distance.h"
#include "fit/report.h"
#include "fit/whorl_ellipse.h"
#include "plate/views.h"
#include "support/shell_specimen.h"
#include "trace/embree_solid.h"

#include <algorithm>
#include <cmath>

using namespace whorl;
using fit::Parameter;
using specimen::TracedOutline;

namespace {

// The silhouette as a picture shows it: in rows across the axis, the outermost places where a line of sight meets the solid.
std::vector<TracedOutline::Point> traced(const test::Shell& shell, double azimuth_deg, int rows) {
  const trace::EmbreeSolid solid(shell.field, {2e-5 * shell.height(), false});
  const Frame page = plate::page_frame(shell.scene.law.theta_lip, specimen::Coiling::kDextral, azimuth_deg, 0.0);
  const double far = (shell.scene.bounds.max - shell.scene.bounds.min).length();
  const auto meets = [&](double x, double y) {
    trace::Ray ray{Vec3f(page.to_world({x, y, far})), Vec3f(-page.z)};
    trace::Hit hit;
    return solid.closest(ray, hit);
  };
  std::vector<TracedOutline::Point> left, right;
  const double top = -shell.scene.bounds.min.z, bottom = -shell.scene.bounds.max.z;
  for (int i = 0; i < rows; ++i) {
    const double y = top + (bottom - top) * (i + 0.5) / rows;
    double first = 1e300, last = -1e300;
    constexpr int kAcross = 400;
    for (int j = 0; j <= kAcross; ++j) {
      const double x = far * (static_cast<double>(j) / kAcross - 0.5);
      if (!meets(x, y)) continue;
      first = std::min(first, x);
      last = std::max(last, x);
    }
    if (first > last) continue;
    const auto edge = [&](double inside, double outside) {
      for (int k = 0; k < 30; ++k) {
        const double mid = 0.5 * (inside + outside);
        (meets(mid, y) ? inside : outside) = mid;
      }
      return inside;
    };
    left.push_back({edge(first, first - far / kAcross), y});
    right.push_back({edge(last, last + far / kAcross), y});
  }
  std::reverse(left.begin(), left.end());
  right.insert(right.end(), left.begin(), left.end());  // round the shell
  return right;
}

// Sutures as a picture shows them: in columns along the axis, places where the surface goes over from one whorl to the next.
std::vector<TracedOutline::Point> traced_sutures(const test::Shell& shell, double azimuth_deg, int columns) {
  const trace::EmbreeSolid solid(shell.field, {2e-5 * shell.height(), false});
  const Frame page = plate::page_frame(shell.scene.law.theta_lip, specimen::Coiling::kDextral, azimuth_deg, 0.0);
  const double far = (shell.scene.bounds.max - shell.scene.bounds.min).length();
  // Whorls from the pole at a place of the picture; negative where there is none.
  const auto whorl = [&](double x, double y) {
    trace::Ray ray{Vec3f(page.to_world({x, y, far})), Vec3f(-page.z)};
    trace::Hit hit;
    return solid.closest(ray, hit) && hit.part == trace::Part::kExterior ? static_cast<double>(solid.growth_place(hit).turn) : -1.0;
  };
  std::vector<TracedOutline::Point> points;
  const double top = -shell.scene.bounds.min.z, bottom = -shell.scene.bounds.max.z, step = (top - bottom) / 400.0;
  const double aside = 0.8 * (shell.scene.law.distance + shell.scene.law.half_breadth);
  for (int i = 0; i < columns; ++i) {
    const double x = aside * (2.0 * (i + 0.5) / columns - 1.0);
    double above = whorl(x, top);
    for (double y = top - step; y > bottom; y -= step) {
      const double here = whorl(x, y);
      // A whole turn more, below a place of the tube.
      if (above > 2.0 && here - above > 0.8 && here - above < 1.2) {
        double hi = y + step, lo = y;
        for (int k = 0; k < 25; ++k) {
          const double mid = 0.5 * (lo + hi);
          (whorl(x, mid) - above > 0.5 ? lo : hi) = mid;
        }
        points.push_back({x, 0.5 * (lo + hi)});
      }
      above = here;
    }
  }
  return points;
}

test::ShellPlan spired() {
  test::ShellPlan plan;
  plan.name = "spired";
  plan.whorls = 6.5;
  plan.W = {{0.0, 1.5}};
  plan.D = 0.05;
  plan.T = 2.8;
  plan.S = 1.2;
  plan.size_mm = 24.0;
  plan.wall_mm = 0.2;
  return plan;
}

specimen::MeasuredSpecimen only(const std::vector<TracedOutline>& outlines) {
  specimen::MeasuredSpecimen measured;
  measured.identity.name.value = "traced";
  measured.outlines = outlines;
  return measured;
}

const fit::ParameterResult& parameter(const fit::Fit& fit, Parameter wanted) {
  return *std::find_if(fit.parameters.begin(), fit.parameters.end(), [&](const auto& p) { return p.parameter == wanted; });
}

}  // namespace

TEST_CASE("points of the solid's silhouette lie on the form's outline, in every side view", "[fit]") {
  const test::Shell shell(spired());
  const fit::Form form{shell.scene.law, 0.0, 0.0, 0.0};
  for (const double azimuth : {0.0, 90.0, 180.0, 270.0}) {
    CAPTURE(azimuth);
    TracedOutline outline{TracedOutline::Kind::kSilhouette, azimuth, {}, traced(shell, azimuth, 60), 0.1, {}};
    std::vector<double> distances;
    fit::outline_distances(form, outline, {}, false, distances);
    std::sort(distances.begin(), distances.end(), [](double a, double b) { return std::abs(a) < std::abs(b); });
    // The rim of the lip stands beyond the growth front by its radius, which side views show; the rest is the embryonic cap.
    CHECK(std::abs(distances[distances.size() * 9 / 10]) < 0.002 * shell.height() + 0.5 * shell.plan.wall_mm);
    CHECK(std::abs(distances[distances.size() / 2]) < 5e-4 * shell.height());
  }
}

TEST_CASE("a silhouette with a fifth of its points missing or displaced by 5 % still gives W within 2 %", "[fit]") {
  const test::Shell shell(spired());
  const std::vector<TracedOutline::Point> whole = traced(shell, 0.0, 80);
  for (const char* damage : {"none", "missing", "displaced"}) {
    CAPTURE(damage);
    TracedOutline outline{TracedOutline::Kind::kSilhouette, 0.0, {}, {}, 0.05, {}};
    // A broken stretch, or points slipped outwards by 5 % of the height at random places. The origin of the picture is any.
    std::uint64_t state = 7;
    for (std::size_t i = 0; i < whole.size(); ++i) {
      const double place = static_cast<double>(i) / static_cast<double>(whole.size());
      if (std::string(damage) == "missing" && place > 0.3 && place < 0.5) continue;
      state = state * 6364136223846793005u + 1442695040888963407u;
      const bool slipped = std::string(damage) == "displaced" && (state >> 33) % 5 == 0;
      const double shift = slipped ? std::copysign(0.05 * shell.height(), whole[i].x) : 0.0;
      outline.points.push_back({whole[i].x + shift + 31.0, whole[i].y - 12.0});
    }
    const fit::Fit fit = fit::fit_specimen(only({outline}));
    CAPTURE(fit::to_table(fit, only({outline}), {}));
    CHECK(parameter(fit, Parameter::kW).value == Approx(1.5).epsilon(0.02));
    CHECK(fit.verdict != fit::Verdict::kDoesNotFit);
    REQUIRE(fit.outlines.size() == 1);
    CHECK(fit.outlines[0].fits);
  }
}

TEST_CASE("a traced whorl section gives the section's shape, and a mirrored silhouette the same shell", "[fit]") {
  const test::Shell shell(spired());
  const fit::WhorlEllipse section(shell.scene.law, shell.scene.law.theta_lip - kPi);
  TracedOutline ring{TracedOutline::Kind::kSection, 0.0, {specimen::GrowthStage::Kind::kBehindLip, 0.5}, {}, 0.02, {}};
  for (int i = 0; i < 60; ++i) {
    const growth::HalfPlanePoint p = section.point(kTwoPi * i / 60.0);
    ring.points.push_back({p.rho + 5.0, -p.z + 9.0});
  }
  TracedOutline silhouette{TracedOutline::Kind::kSilhouette, 0.0, {}, traced(shell, 0.0, 60), 0.05, {}};
  for (TracedOutline::Point& p : silhouette.points) p.x = -p.x;
  specimen::MeasuredSpecimen measured = only({silhouette, ring});
  measured.identity.coiling.value = specimen::Coiling::kSinistral;
  const fit::Fit fit = fit::fit_specimen(measured);
  CAPTURE(fit::to_table(fit, measured, {}));
  CHECK(parameter(fit, Parameter::kS).value == Approx(1.2).epsilon(0.01));
  CHECK(parameter(fit, Parameter::kW).value == Approx(1.5).epsilon(0.02));
}

TEST_CASE("points of the solid's sutures lie on the form's, in every side view", "[fit][suture]") {
  const test::Shell shell(spired());
  const fit::Form form{shell.scene.law, 0.0, 0.0, 0.0};
  for (const double azimuth : {0.0, 90.0, 180.0, 270.0}) {
    CAPTURE(azimuth);
    const TracedOutline outline{TracedOutline::Kind::kSuture, azimuth, {}, traced_sutures(shell, azimuth, 24), 0.1, {}};
    REQUIRE(outline.points.size() > 30);
    std::vector<double> distances;
    fit::outline_distances(form, outline, {}, false, distances);
    std::sort(distances.begin(), distances.end(), [](double a, double b) { return std::abs(a) < std::abs(b); });
    CHECK(std::abs(distances[distances.size() / 2]) < 5e-4 * shell.height());
    CHECK(std::abs(distances[distances.size() * 9 / 10]) < 2e-3 * shell.height());
    // Moved towards the apex, all points lie on the apical side by about as much.
    std::vector<double> moved;
    fit::outline_distances(form, outline, {0.0, -0.1, 0.0}, false, moved);
    CHECK(std::count_if(moved.begin(), moved.end(), [](double d) { return d > 0.05 && d < 0.15; }) > static_cast<long>(moved.size()) * 9 / 10);
  }
}

TEST_CASE("traced sutures give the expansion, mirrored ones of a sinistral shell the same, and a fifth of them missing changes little", "[fit][suture]") {
  const test::Shell shell(spired());
  const std::vector<TracedOutline::Point> whole = traced_sutures(shell, 0.0, 24);
  for (const bool sinistral : {false, true}) {
    CAPTURE(sinistral);
    TracedOutline outline{TracedOutline::Kind::kSuture, 0.0, {}, {}, 0.05, {}};
    for (std::size_t i = 0; i < whole.size(); ++i)
      if (i % 5 != 2) outline.points.push_back({(sinistral ? -whole[i].x : whole[i].x) + 3.0, whole[i].y + 40.0});
    specimen::MeasuredSpecimen measured = only({outline});
    measured.identity.coiling.value = sinistral ? specimen::Coiling::kSinistral : specimen::Coiling::kDextral;
    for (const auto& [definition, value] : {std::pair{specimen::Definition::kShellHeightAxial, shell.height()},
                                            {specimen::Definition::kWhorlWidthSection, 2.0 * shell.scene.law.half_breadth}}) {
      specimen::Reading reading;
      reading.definition = definition;
      reading.value = value;
      reading.step = 0.1;
      reading.standard_error = 0.1 / std::sqrt(12.0);
      measured.readings.push_back(reading);
    }
    const fit::Fit fit = fit::fit_specimen(measured);
    CAPTURE(fit::to_table(fit, measured, {}));
    CHECK(parameter(fit, Parameter::kW).value == Approx(1.5).epsilon(0.02));
    CHECK(parameter(fit, Parameter::kT).value == Approx(2.8).epsilon(0.1));
    REQUIRE(fit.outlines.size() == 1);
    CHECK(fit.outlines[0].fits);
  }
}

TEST_CASE("a shell whose last whorl hides the spire has no sutures to hold points against", "[fit][suture]") {
  test::ShellPlan flat = spired();
  flat.T = 0.0;
  const fit::Form form{growth::coiling_law(test::specimen_of(flat).growth, test::specimen_of(flat).section), 0.0, 0.0, 0.0};
  fit::Form convolute = form;
  convolute.law.distance = convolute.law.half_breadth;  // D = 0: each whorl clasps all earlier ones
  const TracedOutline outline{TracedOutline::Kind::kSuture, 0.0, {}, std::vector<TracedOutline::Point>(8, {0.1, 0.2}), 0.1, {}};
  std::vector<double> distances;
  fit::outline_distances(convolute, outline, {}, false, distances);
  CHECK(std::isinf(distances.at(0)));
}
