// SPDX-License-Identifier: Apache-2.0
// Renders balls by the quadratic formula.
#include "plate/ball_shell.h"

#include "trace/surfaces.h"

#include <algorithm>
#include <cmath>
#include <numbers>
#include <string>

namespace whorl::test_plate {
namespace {

template <class T>
specimen::Stated<T> stated(T value) {
  return {value, {1, 1}, true};
}
template <class T>
specimen::Stated<T> assumed(T value) {
  return {value, {}, false};
}

constexpr int kGrid = 4;
constexpr double kFrontMm = 100.0;

struct Seen {
  double depth = 1e300;
  Vec3 normal;  // in the page's frame
  Vec3f albedo;
  trace::Part part = trace::Part::kNothing;
};

/// Balls whose centres are in the page's frame.
Seen look(const std::vector<Ball>& balls, const Vec3& page, bool cut) {
  Seen seen;
  for (const Ball& ball : balls) {
    const Vec3& centre = ball.centre_mm;
    const double x = page.x - centre.x, y = page.y - centre.y, r = ball.radius_mm;
    const double square = r * r - x * x - y * y;
    if (square < 0.0) continue;
    double z = centre.z + std::sqrt(square);
    Vec3 normal(x / r, y / r, std::sqrt(square) / r);
    trace::Part part = trace::Part::kExterior;
    if (cut && z > 0.0) {
      if (centre.z - std::sqrt(square) > 0.0) continue;
      z = 0.0, normal = Vec3(0.0, 0.0, 1.0), part = trace::Part::kCutFace;
    }
    if (kFrontMm - z < seen.depth) seen = {kFrontMm - z, normal, ball.albedo, part};
  }
  return seen;
}

}  // namespace

void add_panel(specimen::Specimen& s, specimen::ViewName view, double scale) {
  specimen::Panel panel;
  panel.view = stated(view);
  panel.scale = scale == 1.0 ? assumed(1.0) : stated(scale);
  s.plate.panels.push_back(panel);
}

specimen::Specimen demo_specimen(double resolution_ppi) {
  specimen::Specimen s;
  s.source = "scenes/tall.toml";
  s.text = "format = 1\n";
  s.identity.name = stated<std::string>("Cochlidion argutum");
  s.identity.author = stated<std::string>("Hallmer, 1871");
  s.identity.catalogue = stated<std::string>("KSM 4471");
  s.identity.locality = stated<std::string>("Isle of Kess");
  s.identity.coiling = stated(specimen::Coiling::kDextral);
  s.identity.mineral = assumed(specimen::Mineral::kAragonite);
  s.growth.whorls = stated(7.25);
  s.growth.W = stated(specimen::Stages{{0.0, 1.42}});
  s.growth.D = stated(0.06);
  s.growth.T = stated(2.6);
  s.growth.start = assumed(0.75);
  s.section.S = stated(1.15);
  s.section.roll_deg = assumed(0.0);
  s.size = {stated(specimen::SizeKind::kShellHeight), stated(24.0)};
  s.wall = {stated(0.45), assumed(specimen::WallGrowth::kProportional), assumed(0.18)};
  s.lip = {assumed(12.0), assumed(0.8)};
  s.light = {assumed(135.0), assumed(45.0), assumed(12.0), assumed(0.35), assumed(0.0)};
  s.plate.width_mm = stated(180.0);
  s.plate.resolution_ppi = stated(resolution_ppi);
  s.plate.background = assumed(specimen::Background::kWhite);
  s.plate.columns = stated(3);
  s.plate.gap_mm = assumed(4.0);
  s.plate.letters = assumed(specimen::Letters::kUpper);
  s.plate.bar_mm = assumed(0.0);
  s.plate.quality = assumed(specimen::Quality::kPrint);
  for (const auto view : {specimen::ViewName::kApertural, specimen::ViewName::kAbapertural, specimen::ViewName::kApical})
    add_panel(s, view);
  return s;
}

std::vector<Ball> coil_of_balls(const specimen::Specimen& s, double height_mm) {
  const double lip = kTwoPi * s.growth.whorls.value, k = std::log(s.growth.W.value.front().W) / kTwoPi;
  std::vector<Ball> balls;
  for (double theta = 0.0; theta < lip + 0.05; theta += 0.1) {
    const double g = std::exp(k * (std::min(theta, lip) - lip)), d = 0.22 * height_mm * g;
    balls.push_back({Vec3(d * std::cos(theta), d * std::sin(theta), 0.78 * height_mm * g), 0.2 * height_mm * g});
  }
  const Vec3 onwards(-std::sin(lip), std::cos(lip), 0.0);
  balls.push_back({balls.back().centre_mm + onwards * (0.06 * height_mm), 0.17 * height_mm, Vec3f(0.25f, 0.12f, 0.08f)});
  return balls;
}

std::vector<plate::Extents> extents_of(const std::vector<Ball>& balls, const std::vector<plate::View>& views) {
  std::vector<plate::Extents> all;
  for (const plate::View& view : views) {
    plate::Extents e{-1e300, -1e300, -1e300, -1e300, -1e300};
    for (const Ball& ball : balls) {
      const Vec3 c = view.page_to_shell.to_frame(ball.centre_mm);
      double r = ball.radius_mm;
      if (view.cut && c.z > 0.0) {
        if (c.z >= r) continue;
        r = std::sqrt(r * r - c.z * c.z);
      }
      e = {std::max(e.left, r - c.x), std::max(e.right, r + c.x), std::max(e.above, r + c.y), std::max(e.below, r - c.y),
           std::max(e.upper_left, c.y - c.x + std::numbers::sqrt2 * r)};
    }
    all.push_back(e);
  }
  return all;
}

transport::Film film_of(const std::vector<Ball>& balls, const plate::FigurePanel& panel) {
  transport::Film film(panel.rect.width, panel.rect.height);
  std::vector<Ball> on_page = balls;
  for (Ball& ball : on_page) ball.centre_mm = panel.view.page_to_shell.to_frame(ball.centre_mm);
  const Vec3 to_light = Vec3(-0.5, 0.5, std::sqrt(0.5));
  for (int y = 0; y < film.height; ++y)
    for (int x = 0; x < film.width; ++x) {
      const std::size_t at = film.index(x, y);
      for (int s = 0; s <= kGrid * kGrid; ++s) {
        const bool middle = s == kGrid * kGrid;  // for the facts
        const double px = x + (middle ? 0.5 : (s % kGrid + 0.5) / kGrid), py = y + (middle ? 0.5 : (s / kGrid + 0.5) / kGrid);
        const Vec3 page((px - panel.pole_px.x) * panel.mm_per_pixel, (panel.pole_px.y - py) * panel.mm_per_pixel, 0.0);
        const Seen seen = look(on_page, page, panel.view.cut);
        if (seen.part == trace::Part::kNothing) continue;
        if (middle) {
          film.facts[at] = {static_cast<float>(seen.depth), Vec3f(seen.normal), seen.albedo, 1.25f, 30.0f,
                            static_cast<std::uint8_t>(seen.part)};
          continue;
        }
        const float light = static_cast<float>(std::max(0.0, seen.normal.dot(to_light)) + 0.18) / (kGrid * kGrid);
        film.radiance[at] += seen.albedo * light;
        film.coverage[at] += 1.0f / (kGrid * kGrid);
      }
    }
  film.mean_samples = film.max_samples = kGrid * kGrid;
  film.rays_camera = film.size() * kGrid * kGrid;
  return film;
}

std::vector<transport::Film> films_of(const std::vector<Ball>& balls, const plate::FigurePlan& plan) {
  std::vector<transport::Film> films;
  for (const plate::FigurePanel& panel : plan.panels) films.push_back(film_of(balls, panel));
  return films;
}

}  // namespace whorl::test_plate
