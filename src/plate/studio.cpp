// SPDX-License-Identifier: Apache-2.0
// From a specimen to pictures of it.
#include "plate/studio.h"

#include "compile/compile.h"
#include "growth/extents.h"
#include "growth/surface_frame.h"
#include "plate/provenance_layer.h"
#include "shaders_cpu/medium/attenuation.h"
#include "trace/mould_solid.h"
#include "trace/sectioned_solid.h"
#include "transport/lighting.h"
#include "transport/path_tracer.h"
#include "transport/radiograph.h"

#include <algorithm>
#include <chrono>
#include <optional>

namespace whorl::plate {
namespace {

// The cells' surface stays this near to the true one, and nearer where a measure asks for it.
constexpr double kOfAPixel = 0.1;

// Nothing but outlines is noisy in a radiograph.
constexpr int kRadiographSamples = 32;

// The direction towards the reader, square to the axis of coiling.
Vec3 beside_axis(const Vec3& towards_reader) { return Vec3(towards_reader.x, towards_reader.y, 0.0).normalized(); }

// Where attached solids reach farthest, for framing; and a box that holds them.
void add_attached(const scene::Scene& scene, std::vector<Vec3>& points, Box3& box) {
  constexpr int kPlaces = 4;
  for (const scene::Horn& h : scene.attached.horns) {
    box.extendBy(scene::box_of(h));
    for (int i = 1; i <= kPlaces; ++i) points.push_back(scene::axis_at(h, h.length * i / kPlaces).point);
  }
  for (const scene::Bead& b : scene.attached.beads) {
    box.extendBy(scene::box_of(b));
    points.push_back(Vec3(b.centre) + Vec3(b.rows[2]) / Vec3(b.rows[2]).length2());
  }
  for (const scene::Guest& g : scene.attached.guests) {
    box.extendBy(scene::box_of(g));
    for (const Vec3& p : growth::surface_points(compile::exterior_of(*g.shell), 60, 24)) points.push_back(g.origin + g.frame.to_world(p));
  }
  const growth::Exterior shell = compile::exterior_of(scene);
  for (const scene::Ledge& l : scene.attached.ledges)
    for (int i = 0; i <= kPlaces; ++i) {
      const double at = l.from + (l.to - l.from) * i / kPlaces;
      const bool round = l.run == scene::Ledge::Run::kRoundSection;
      const growth::SurfaceFrame f = growth::surface_frame(shell, round ? l.growth : at, round ? at : l.psi);
      points.push_back(f.point + l.height * (f.normal + l.tan_lean * f.forward));
      box.extendBy(points.back());
    }
}

double now() {
  return std::chrono::duration<double>(std::chrono::steady_clock::now().time_since_epoch()).count();
}

}  // namespace

QualitySteps quality_steps(specimen::Quality quality) {
  switch (quality) {
    case specimen::Quality::kDraft: return {0.25, 16, 16};
    case specimen::Quality::kProof: return {0.5, 64, 64};
    case specimen::Quality::kPrint: break;
  }
  return {1.0, 128, 1024};
}

specimen::Specimen at_quality(specimen::Specimen specimen, specimen::Quality quality) {
  specimen.plate.quality.value = quality;
  specimen.plate.resolution_ppi.value *= quality_steps(quality).resolution;
  return specimen;
}

Studio::Studio(const specimen::Specimen& specimen) : specimen_(specimen) {
  const double start = now();
  scene_ = std::make_unique<scene::Scene>(compile::compile_scene(specimen));
  field_ = std::make_unique<field::Field>(*scene_);
  constexpr int kTurnSteps = 360, kAround = 180;
  points_ = growth::surface_points(compile::exterior_of(*scene_), kTurnSteps, kAround);
  // The rim stands out beyond the growth front by its radius.
  const double lip = scene_->law.theta_lip;
  const Vec3 forward(-std::sin(lip), std::cos(lip), 0.0);
  const Vec3 mouth(scene_->law.distance * std::cos(lip), scene_->law.distance * std::sin(lip), scene_->law.depth);
  const double nearby = 1.5 * scene_->law.half_breadth * std::max(1.0, scene_->law.S);
  const std::size_t count = points_.size();
  for (std::size_t i = 0; i < count; ++i)
    if ((points_[i] - mouth).length() < nearby) points_.push_back(points_[i] + scene_->front.rim_radius * forward);
  bounds_ = scene_->bounds;
  if (!scene_->attached.empty()) {
    add_attached(*scene_, points_, bounds_);
    const Vec3 room(0.02 * (bounds_.max - bounds_.min).length());  // for crests between the places asked
    bounds_ = {bounds_.min - room, bounds_.max + room};
  }
  front_mm_ = 1.01 * std::max(bounds_.min.length(), bounds_.max.length());
  materials_ = transport::make_materials(*field_, specimen_);
  whitened_ = transport::whitened(materials_, *field_);
  compile_seconds_ = now() - start;
}

void Studio::set_up(double mm_per_pixel, bool exact) {
  const double start = now();
  const double tolerance = std::min(kOfAPixel * mm_per_pixel, scene::measuring_tolerance_mm(*scene_));
  solid_ = std::make_unique<trace::EmbreeSolid>(*field_, trace::SolidOptions{tolerance, exact});
  if (!scene_->attached.empty()) attached_ = std::make_unique<trace::AttachedSolids>(*field_);
  if (const auto medium = transport::make_medium(specimen_))
    materials_.wall = std::make_shared<const transport::TranslucentWall>(*solid_, *medium);
  compile_seconds_ += now() - start;
}

transport::Film Studio::picture(const View& view, specimen::PanelLook look, specimen::Shows shows, const transport::Camera& camera, const QualitySteps& steps,
                                std::uint64_t seed, std::uint32_t number, const transport::Progress& progress) const {
  transport::Film film = exposed(view, look, shows, camera, steps, seed, number, progress);
  const specimen::Preservation preservation(specimen_);
  if (preservation.stated()) add_provenance(preservation, *field_, camera, film);
  return film;
}

transport::Film Studio::exposed(const View& view, specimen::PanelLook look, specimen::Shows shows, const transport::Camera& camera, const QualitySteps& steps,
                                std::uint64_t seed, std::uint32_t number, const transport::Progress& progress) const {
  const trace::UnitedSolid all(*solid_, attached_.get());
  if (look == specimen::PanelLook::kRadiograph) {
    transport::RadiographJob job;
    job.solid = solid_.get();
    job.attached = attached_.get();
    job.bounds_mm = bounds_;
    job.camera = camera;
    job.attenuation_per_mm = shaders_cpu::carbonate_attenuation_per_mm(
        specimen_.radiograph.energy_kev, specimen::mineral_density(specimen_.identity.mineral));
    job.bright_shell = specimen_.plate.background == specimen::Background::kBlack;
    job.samples_per_pixel = std::min(steps.samples, kRadiographSamples);
    job.seed = seed;
    job.panel = number;
    return transport::radiograph(job, progress);
  }
  std::vector<transport::PlacedLamp> lamps;
  if (shows == specimen::Shows::kShell)  // a mould fills the place of lamps
    for (const scene::Lamp& lamp : scene_->lamps)
      lamps.push_back({lamp.centre, lamp.radius, lamp.strength, lamp.temperature_k});
  std::optional<trace::SectionedSolid> half;
  if (view.cut) half.emplace(all, view.fixed_page.z);

  transport::RenderJob job;
  job.shell = half ? static_cast<const trace::Surfaces*>(&*half) : &all;
  std::optional<trace::MouldSolid> mould;
  if (shows == specimen::Shows::kMould) mould.emplace(*solid_);
  if (shows == specimen::Shows::kBoth) mould.emplace(all, beside_axis(view.fixed_page.z));
  if (mould) job.shell = &*mould;
  job.bounds_mm = bounds_;
  job.camera = camera;
  job.lighting = transport::light_page(specimen_.light, lamps, view.fixed_page);
  job.materials = look == specimen::PanelLook::kWhitened ? whitened_ : materials_;
  if (view.cut || mould) job.materials.wall.reset();
  job.samples_per_pixel = steps.samples;
  job.most_samples = steps.most_samples;
  job.seed = seed;
  job.panel = number;
  return transport::render(job, progress);
}

}  // namespace whorl::plate
