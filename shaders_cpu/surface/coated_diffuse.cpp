// SPDX-License-Identifier: Apache-2.0
// Evaluation and sampling of the coated matt surface.
#include "shaders_cpu/surface/coated_diffuse.h"

#include "math/basis3f.h"
#include "math/hemisphere.h"
#include "shaders_cpu/surface/fresnel.h"
#include "shaders_cpu/surface/ggx.h"

#include <algorithm>

namespace whorl::shaders_cpu {
namespace {
constexpr float kInvPi = static_cast<float>(1.0 / kPi);

Vec3f root(const Vec3f& c) noexcept { return {std::sqrt(c.x), std::sqrt(c.y), std::sqrt(c.z)}; }

/// 1 / (1 - mean); a perfect mirror has no body to see.
Vec3f over(const Vec3f& mean) noexcept {
  const auto one = [](float m) { return 1.0f / std::max(1.0f - m, 1e-4f); };
  return {one(mean.x), one(mean.y), one(mean.z)};
}

}

double alpha_of_gloss(double gloss) {
  const double roughness = 1.0 - std::clamp(gloss, 0.0, 1.0) * (1.0 - std::sqrt(kPolishedAlpha));
  return roughness * roughness;
}

SurfaceView::SurfaceView(const CoatedDiffuse& surface, const Vec3f& wo) noexcept
    : wo_(wo),
      body_(surface.albedo * kInvPi),
      coat_(surface.coat),
      nacre_(surface.nacre),
      nacre_scale_(surface.nacre_scale) {
  if (nacre_) {
    const Vec3f share = nacre_->at(wo.z, nacre_scale_), mean = nacre_->mean(nacre_scale_);
    const float coat_light = luminance(share), body_light = luminance((Vec3f(1.0f) - share) * surface.albedo);
    coat_chance_ = coat_light / std::max(coat_light + body_light, 1e-6f);
    body_chance_ = 1.0f - coat_chance_;
    lambda_ = ggx_lambda(wo, nacre_->alpha());
    body_ *= (Vec3f(1.0f) - share) * over(mean);
    return;
  }
  if (!coat_) return;
  const float share = coat_->at(wo.z);
  const float body_share = (1.0f - share) * luminance(surface.albedo);
  coat_chance_ = share / (share + body_share);
  body_chance_ = 1.0f - coat_chance_;
  lambda_ = ggx_lambda(wo, coat_->alpha());
  body_ *= (1.0f - share) / (1.0f - coat_->mean());
}

SurfaceView SurfaceView::face(const CoatedDiffuse& surface, const Vec3f& wo) noexcept {
  SurfaceView view(surface, wo);
  const Vec3f share = view.nacre_ ? view.nacre_->at(wo.z, view.nacre_scale_) : Vec3f(view.coat_ ? view.coat_->at(wo.z) : 0.0f);
  view.body_ = Vec3f(0.0f);
  view.body_chance_ = 0.0f;
  view.coat_chance_ = std::min(luminance(share), 0.99f);
  view.inward_ = (Vec3f(1.0f) - share) * root(surface.albedo) * (1.0f / (1.0f - view.coat_chance_));
  return view;
}

SurfaceView SurfaceView::leaving(const CoatedDiffuse& surface) noexcept {
  SurfaceView view({root(surface.albedo), nullptr}, Vec3f(0.0f, 0.0f, 1.0f));
  view.coat_ = surface.coat;
  view.nacre_ = surface.nacre;
  view.nacre_scale_ = surface.nacre_scale;
  view.leaving_ = true;
  if (view.nacre_) view.body_ *= over(view.nacre_->mean(view.nacre_scale_));
  else if (view.coat_) view.body_ *= 1.0f / (1.0f - view.coat_->mean());
  return view;
}

Reflection SurfaceView::reflect(const Vec3f& wi) const noexcept {
  if (wi.z <= 0.0f) return {};
  const float body_pdf = cosine_pdf(wi.z);
  if (leaving_) {
    const Vec3f share = nacre_ ? nacre_->at(wi.z, nacre_scale_) : Vec3f(coat_ ? coat_->at(wi.z) : 0.0f);
    return {body_ * (Vec3f(1.0f) - share), body_pdf};
  }
  if (!coat_ && !nacre_) return {body_, body_pdf};
  const float alpha = nacre_ ? nacre_->alpha() : coat_->alpha();
  const Vec3f h = unit(wo_ + wi);
  const float mirrored = ggx_density(h, alpha) / (4.0f * wo_.z);
  const float shadowed = mirrored / ((1.0f + lambda_ + ggx_lambda(wi, alpha)) * wi.z);
  const float pdf = coat_chance_ * mirrored / (1.0f + lambda_) + body_chance_ * body_pdf;
  if (nacre_)
    return {body_ * (Vec3f(1.0f) - nacre_->at(wi.z, nacre_scale_)) + nacre_->facet(wo_.dot(h), nacre_scale_) * shadowed, pdf};
  return {body_ * (1.0f - coat_->at(wi.z)) + Vec3f(fresnel_dielectric(wo_.dot(h), coat_->index()) * shadowed), pdf};
}

Scatter SurfaceView::scatter(float choice, float u1, float u2) const noexcept {
  if (body_chance_ > 0.0f && choice >= coat_chance_) {
    const Vec3f wi = cosine_direction(u1, u2);
    return {wi, reflect(wi)};
  }
  const Vec3f h = ggx_visible_normal(wo_, nacre_ ? nacre_->alpha() : coat_->alpha(), std::sqrt(u1), static_cast<float>(kTwoPi) * u2);
  const Vec3f wi = unit(h * (2.0f * wo_.dot(h)) - wo_);
  return {wi, reflect(wi)};
}

}  // namespace whorl::shaders_cpu
