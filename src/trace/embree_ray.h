// SPDX-License-Identifier: Apache-2.0
// A ray in Embree's words.
#pragma once

#include "trace/embree_shim.h"
#include "trace/surfaces.h"

namespace whorl::trace::embree {

inline RTCRay ray_of(const Ray& ray) {
  RTCRay r;
  r.org_x = ray.origin.x;
  r.org_y = ray.origin.y;
  r.org_z = ray.origin.z;
  r.dir_x = ray.direction.x;
  r.dir_y = ray.direction.y;
  r.dir_z = ray.direction.z;
  r.tnear = ray.t_min;
  r.tfar = ray.t_max;
  r.time = 0.0f;
  r.mask = 0xFFFFFFFFu;
  r.id = 0;
  r.flags = 0;
  return r;
}

inline RTCRayHit query_of(const Ray& ray) {
  RTCRayHit query;
  query.ray = ray_of(ray);
  query.hit.geomID = RTC_INVALID_GEOMETRY_ID;
  query.hit.instID[0] = RTC_INVALID_GEOMETRY_ID;
  return query;
}

/// Tells the library of a hit of a user primitive. `u` and `v` are the primitive's to use; its normal is found later.
inline void keep_hit(const RTCIntersectFunctionNArguments* a, float t, float u = 0.0f, float v = 0.0f) {
  auto* rayhit = reinterpret_cast<RTCRayHit*>(a->rayhit);
  rayhit->ray.tfar = t;
  rayhit->hit.geomID = a->geomID;
  rayhit->hit.primID = a->primID;
  rayhit->hit.instID[0] = a->context->instID[0];
  rayhit->hit.u = u;
  rayhit->hit.v = v;
  rayhit->hit.Ng_x = rayhit->hit.Ng_y = 0.0f;
  rayhit->hit.Ng_z = 1.0f;
}

}  // namespace whorl::trace::embree
